import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { magOfLight } from './check.js';
import { extinctionAt } from './extinction.js';
import { moonlitSkyMag, vMagOfNanolamberts } from './moonlight.js';
import { moonlightAb } from './moonlight-bands.js';
import { bands, extinction, sky } from '../../../../tests/factories/sky.js';

const visual = { wavelengthNm: bands.V.pivotWavelengthNm, vegaToAbMag: bands.V.vegaToAbMag! };
const extinctionVisualMag = extinctionAt(extinction, visual.wavelengthNm).magPerAirmass;
const geometry = { phaseAngleDeg: 0, moonZenithDistanceDeg: 45, targetZenithDistanceDeg: 30, separationDeg: 60 };

function moonAbMag(wavelengthNm: number, changes: Partial<typeof geometry> = {}): number | null {
  const extinctionMag = extinctionAt(extinction, wavelengthNm).magPerAirmass;
  const input = { geometry: { ...geometry, ...changes }, wavelengthNm, extinctionMag, extinctionVisualMag };
  return magOfLight(moonlightAb(input, sky.sunlight, visual));
}

describe('moonlight in other bands', () => {
  it('is the published model in V', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 150, noNaN: true }),
        fc.double({ min: 1, max: 150, noNaN: true }),
        (phaseAngleDeg, separationDeg) => {
          const input = { ...geometry, phaseAngleDeg, separationDeg };
          const published = moonlitSkyMag({ ...input, darkZenithMag: 21.7, extinctionMag: extinctionVisualMag });
          const expected = vMagOfNanolamberts(published.moonNanolamberts) + visual.vegaToAbMag;
          expect(moonAbMag(visual.wavelengthNm, input)).toBeCloseTo(expected, 10);
        },
      ),
    );
  });

  it('is blue: brighter per wavelength than the Moon itself, fading without a break to the red', () => {
    const colour = moonAbMag(440)! - moonAbMag(visual.wavelengthNm)!;
    expect(colour).toBeLessThan(sky.sunlight.moonColourAb(440));
    for (let nm = 560; nm < 2480; nm += 20) expect(moonAbMag(nm + 20)).toBeGreaterThan(moonAbMag(nm)!);
  });

  it('does not matter from 1.6 µm on: below 3 % of the dark sky 30° from a full Moon', () => {
    // H and Ks of the typical near-infrared night, 15.38 and 14.24 AB.
    for (const [nm, darkAbMag] of [
      [1633, 15.38],
      [2148, 14.24],
    ] as const) {
      expect(10 ** (-0.4 * (moonAbMag(nm, { separationDeg: 30 })! - darkAbMag))).toBeLessThan(0.03);
    }
  });

  it('is none with the Moon down, and refused where the colours end', () => {
    expect(moonAbMag(800, { moonZenithDistanceDeg: 91 })).toBeNull();
    expect(() => moonAbMag(2600)).toThrow('wavelengthNm must be between 300 and 2500 nm');
  });
});

describe('colours of sunlight', () => {
  it('are 0 in V and those of the Sun in Vega magnitudes', () => {
    const vega = (id: 'B' | 'J' | 'Ks') =>
      sky.sunlight.solarColourAb(bands[id].pivotWavelengthNm) - bands[id].vegaToAbMag! + bands.V.vegaToAbMag!;
    expect(sky.sunlight.solarColourAb(visual.wavelengthNm)).toBe(0);
    // B − V = 0.65, V − J = 1.15, V − Ks = 1.55 of the Sun, from memory, 0.05 to 0.1 mag between authors.
    expect(Math.abs(vega('B') - 0.65)).toBeLessThan(0.1);
    expect(Math.abs(vega('J') + 1.15)).toBeLessThan(0.1);
    expect(Math.abs(vega('Ks') + 1.55)).toBeLessThan(0.1);
  });

  it('make the Moon redder than the Sun: B − V = 0.92 (from memory) against 0.65', () => {
    const { moonColourAb, solarColourAb } = sky.sunlight;
    const redder = moonColourAb(bands.B.pivotWavelengthNm) - solarColourAb(bands.B.pivotWavelengthNm);
    expect(Math.abs(redder - 0.27)).toBeLessThan(0.1);
  });
});
