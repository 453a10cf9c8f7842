/** Against 1473 computed cases of the published model, numbers of the publication, and what must hold anywhere. */
import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  illuminatedFractionOfPhase,
  moonIlluminance,
  moonlitSkyMag,
  moonScattering,
  nanolambertsOfVMag,
  phaseOfIlluminatedFraction,
  vMagOfNanolamberts,
  type MoonlitSkyInput,
} from './moonlight.js';

interface Row {
  phase_angle_deg: number;
  moon_zenith_deg: number;
  target_zenith_deg: number;
  separation_deg: number;
  k_mag: number;
  dark_zenith_mag: number;
  moon_nL: number;
  dark_nL: number;
  total_mag_arcsec2: number;
  delta_V_mag: number;
}

const { rows } = JSON.parse(
  readFileSync(new URL('../../../../tests/reference/moonlight.json', import.meta.url), 'utf8'),
) as { rows: Row[] };

const inputOf = (row: Row): MoonlitSkyInput => ({
  darkZenithMag: row.dark_zenith_mag,
  extinctionMag: row.k_mag,
  phaseAngleDeg: row.phase_angle_deg,
  moonZenithDistanceDeg: row.moon_zenith_deg,
  targetZenithDistanceDeg: row.target_zenith_deg,
  separationDeg: row.separation_deg,
});

describe('the published model in V', () => {
  it('meets every computed case, inside and outside the aureole', () => {
    expect(rows).toHaveLength(1473);
    expect(rows.some((row) => row.separation_deg < 10)).toBe(true);
    for (const row of rows) {
      const sky = moonlitSkyMag(inputOf(row));
      expect(Math.abs(sky.moonNanolamberts / row.moon_nL - 1)).toBeLessThan(1e-9);
      expect(Math.abs(sky.darkNanolamberts / row.dark_nL - 1)).toBeLessThan(1e-9);
      expect(Math.abs(sky.magPerArcsec2 - row.total_mag_arcsec2)).toBeLessThan(1e-9);
      expect(Math.abs(sky.brighteningMag + row.delta_V_mag)).toBeLessThan(1e-9);
    }
  });

  it.each([
    // Worked by hand from the formulas, to the digits given.
    [0, 30, 17.58],
    [0, 60, 18.27],
    [0, 90, 18.59],
    [60, 60, 19.69],
    [90, 60, 20.39],
    [90, 90, 20.59],
    [120, 60, 21.01],
    [150, 60, 21.34],
  ])('phase angle %d°, %d° away: V = %d', (phaseAngleDeg, separationDeg, magPerArcsec2) => {
    const at45 = { moonZenithDistanceDeg: 45, targetZenithDistanceDeg: 45, darkZenithMag: 21.7, extinctionMag: 0.172 };
    expect(moonlitSkyMag({ ...at45, phaseAngleDeg, separationDeg }).magPerArcsec2).toBeCloseTo(magPerArcsec2, 2);
  });

  it('has 79 nL at V = 21.587, the dark sky of the publication', () => {
    expect(nanolambertsOfVMag(21.587)).toBeCloseTo(79, 1);
  });

  it('steps by 28 % in the Mie term at 10°, and is constant over the disc', () => {
    expect(moonScattering(10).mie / moonScattering(10 - 1e-9).mie).toBeCloseTo(1.281, 3);
    expect(moonScattering(0)).toMatchObject({ mie: 6.2e7 / 0.0625 });
    expect(moonScattering(0.2).mie).toBe(moonScattering(0).mie);
  });

  it('has 9 % of the full light at quarter', () => {
    expect(moonIlluminance(90) / moonIlluminance(0)).toBeCloseTo(0.091, 3);
    expect(illuminatedFractionOfPhase(90)).toBeCloseTo(0.5, 12);
  });
});

const geometry = fc.record({
  darkZenithMag: fc.double({ min: 20, max: 22.5, noNaN: true }),
  extinctionMag: fc.double({ min: 0.05, max: 0.5, noNaN: true }),
  phaseAngleDeg: fc.double({ min: 0, max: 170, noNaN: true }),
  moonZenithDistanceDeg: fc.double({ min: 0, max: 90, noNaN: true }),
  targetZenithDistanceDeg: fc.double({ min: 0, max: 80, noNaN: true }),
  separationDeg: fc.double({ min: 10, max: 89, noNaN: true }),
});

describe('moonlight', () => {
  it('only ever brightens, more with a fuller Moon, and more nearer to it', () => {
    fc.assert(
      fc.property(geometry, fc.double({ min: 0.5, max: 10, noNaN: true }), (input, step) => {
        const here = moonlitSkyMag(input);
        const fuller = moonlitSkyMag({ ...input, phaseAngleDeg: Math.max(0, input.phaseAngleDeg - step) });
        const nearer = moonlitSkyMag({ ...input, separationDeg: Math.max(10, input.separationDeg - step) });
        expect(here.brighteningMag).toBeGreaterThan(0);
        expect(fuller.magPerArcsec2).toBeLessThanOrEqual(here.magPerArcsec2);
        expect(nearer.magPerArcsec2).toBeLessThanOrEqual(here.magPerArcsec2);
      }),
    );
  });

  it('is gone when the Moon has set, and the sky is then never brighter than just before', () => {
    fc.assert(
      fc.property(geometry, fc.double({ min: 90.001, max: 180, noNaN: true }), (input, moonZenithDistanceDeg) => {
        const down = moonlitSkyMag({ ...input, moonZenithDistanceDeg });
        const onHorizon = moonlitSkyMag({ ...input, moonZenithDistanceDeg: 90 });
        expect(down).toMatchObject({ moonNanolamberts: 0, brighteningMag: 0 });
        expect(down.magPerArcsec2).toBeGreaterThan(onHorizon.magPerArcsec2);
      }),
    );
  });

  it('adds the same light whatever the dark sky', () => {
    fc.assert(
      fc.property(geometry, (input) => {
        const darker = moonlitSkyMag({ ...input, darkZenithMag: input.darkZenithMag + 0.5 });
        expect(darker.moonNanolamberts).toBe(moonlitSkyMag(input).moonNanolamberts);
        expect(darker.brighteningMag).toBeGreaterThan(moonlitSkyMag(input).brighteningMag);
      }),
    );
  });

  it('turns magnitudes to nanolamberts and back, and phases to lit fractions and back', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 10, max: 26, noNaN: true }),
        fc.double({ min: 0.01, max: 0.99, noNaN: true }),
        (mag, lit) => {
          expect(vMagOfNanolamberts(nanolambertsOfVMag(mag))).toBeCloseTo(mag, 11);
          expect(illuminatedFractionOfPhase(phaseOfIlluminatedFraction(lit))).toBeCloseTo(lit, 12);
        },
      ),
    );
  });

  it('refuses angles that cannot be', () => {
    const input = inputOf(rows[0]!);
    expect(() => moonlitSkyMag({ ...input, separationDeg: -1 })).toThrow('separationDeg');
    expect(() => moonlitSkyMag({ ...input, targetZenithDistanceDeg: 91 })).toThrow('targetZenithDistanceDeg');
    expect(() => moonlitSkyMag({ ...input, phaseAngleDeg: NaN })).toThrow('phaseAngleDeg');
    expect(() => phaseOfIlluminatedFraction(1.1)).toThrow('illuminatedFraction');
  });
});
