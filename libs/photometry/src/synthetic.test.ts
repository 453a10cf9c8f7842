import { gaussLegendre } from '@faintward/numerics';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { OutOfDomainError } from './domain.js';
import { boxCurve, curveValueAt, sampledCurve, type SampledCurve } from './sampled-curve.js';
import {
  abMagnitudeAt,
  abMagnitudeOfFrequency,
  abMagnitudeOfPhotons,
  fluxPerNmOfAbMagnitude,
  janskyOfFrequency,
  linePhotonIntegral,
  photonIntegral,
  photonsOfAbMagnitude,
  pointWeights,
  responseOf,
  responseShare,
  syntheticAbMagnitude,
} from './synthetic.js';

/** ∫ of f over the stretches between all points of both curves, by an integrator of its own. */
function byQuadrature(f: (nm: number) => number, curves: readonly SampledCurve[], stretch = 1): number {
  const [spectrum, response] = curves as [SampledCurve, SampledCurve];
  const knots = [...Array.from(spectrum.wavelengthsNm, (nm) => nm * stretch), ...response.wavelengthsNm];
  const low = Math.max(spectrum.wavelengthsNm[0]! * stretch, response.wavelengthsNm[0]!);
  const high = Math.min(spectrum.wavelengthsNm.at(-1)! * stretch, response.wavelengthsNm.at(-1)!);
  const inside = [...new Set(knots)].filter((nm) => nm >= low && nm <= high).sort((a, b) => a - b);
  let sum = 0;
  for (let i = 0; i + 1 < inside.length; i++) sum += gaussLegendre(f, inside[i]!, inside[i + 1]!, 12);
  return sum;
}

/** ∫ g S d ln λ by the weights of the points. */
function weighed(response: SampledCurve, spectrum: SampledCurve, stretch = 1, scratch?: Float64Array): number {
  const { first, weights } = pointWeights(responseOf(response), spectrum.wavelengthsNm, stretch, scratch);
  return weights.reduce((sum, weight, k) => sum + weight * spectrum.values[first + k]!, 0);
}

/** Curves on points 0.05 to 0.5 nm apart, with some jumps. */
const curves = (lowNm: number) =>
  fc
    .array(
      fc.record({
        width: fc.double({ min: 0.05, max: 0.5, noNaN: true }),
        value: fc.double({ min: 0, max: 1, noNaN: true }),
        jumpsTo: fc.option(fc.double({ min: 0, max: 1, noNaN: true }), { freq: 4 }),
      }),
      { minLength: 2, maxLength: 40 },
    )
    .map((steps) => {
      const points: [number, number][] = [];
      let nm = lowNm;
      for (const { width, value, jumpsTo } of steps) {
        nm += width;
        points.push([nm, value]);
        if (jumpsTo !== null) points.push([nm, jumpsTo]);
      }
      return sampledCurve(
        points.map(([x]) => x),
        points.map(([, y]) => y),
      );
    })
    .filter(({ wavelengthsNm, values }) => {
      // One value above 0 can stand alone at a jump.
      const hasArea = (value: number, i: number) => value > 0.01 && wavelengthsNm[i + 1]! > wavelengthsNm[i]!;
      return values.some(hasArea);
    });

describe('the weights of points', () => {
  it('integrate any spectrum over any response, jumps and partial overlap included', () => {
    let overlapping = 0;
    fc.assert(
      fc.property(
        curves(500),
        curves(250),
        fc.double({ min: 1.99, max: 2.01, noNaN: true }),
        (response, spectrum, stretch) => {
          const expected = byQuadrature(
            (nm) => (curveValueAt(spectrum, nm / stretch) * curveValueAt(response, nm)) / nm,
            [spectrum, response],
            stretch,
          );
          if (expected > 0) overlapping++;
          // Pieces up to 1e-3 wide in ln λ on which both go from 0 to 1: 6e-12 of each is left, of some 1e-3.
          expect(Math.abs(weighed(response, spectrum, stretch) - expected)).toBeLessThan(1e-10);
        },
      ),
      { numRuns: 500 },
    );
    expect(overlapping).toBeGreaterThan(100);
  });

  it('give a flat f_ν its logarithmic width, whatever the points', () => {
    const nodesNm = Float64Array.from({ length: 3000 }, (_, i) => 300 * Math.exp(i * 1e-3));
    const flat = { wavelengthsNm: nodesNm, values: new Float64Array(3000).fill(1) };
    expect(weighed(boxCurve(555, 690), flat)).toBeCloseTo(Math.log(690 / 555), 12);
    expect(weighed(boxCurve(555, 690), flat, 1.7)).toBeCloseTo(Math.log(690 / 555), 12);
  });

  it('end where the spectrum ends, and are none where both do not meet', () => {
    const spectrum = sampledCurve([600, 620], [1, 1]);
    expect(weighed(boxCurve(555, 610), spectrum)).toBeCloseTo(Math.log(610 / 600), 6);
    expect(weighed(boxCurve(610, 700), spectrum)).toBeCloseTo(Math.log(620 / 610), 6);
    expect(pointWeights(responseOf(boxCurve(700, 800)), spectrum.wavelengthsNm).weights).toHaveLength(0);
    expect(pointWeights(responseOf(boxCurve(620, 800)), spectrum.wavelengthsNm).weights).toHaveLength(0);
  });

  it('are the same in a scratch array that held something else', () => {
    const spectrum = sampledCurve([500, 560, 560, 600, 720], [1, 2, 0.5, 1, 3]);
    const scratch = new Float64Array(8).fill(7);
    expect(weighed(boxCurve(555, 690), spectrum, 1, scratch)).toBe(weighed(boxCurve(555, 690), spectrum));
    expect(scratch.some((value) => value !== 7)).toBe(true);
    expect(weighed(boxCurve(555, 690), spectrum, 1, new Float64Array(1))).toBe(weighed(boxCurve(555, 690), spectrum));
  });
});

describe('the photon integral', () => {
  it('is exact for straight pieces', () => {
    fc.assert(
      fc.property(curves(500), curves(500), (response, spectrum) => {
        const expected = byQuadrature(
          (nm) => nm * curveValueAt(spectrum, nm) * curveValueAt(response, nm),
          [spectrum, response],
        );
        const found = photonIntegral(responseOf(response), spectrum);
        expect(Math.abs(found - expected)).toBeLessThan(1e-10 * Math.max(1, expected));
      }),
    );
  });

  it('gives the AB magnitude of a flat spectrum in any response, and back', () => {
    const nm = Float64Array.from({ length: 4000 }, (_, i) => 400 + i / 10);
    const flat = sampledCurve(
      nm,
      nm.map((each) => fluxPerNmOfAbMagnitude(21.3, each)),
    );
    const response = responseOf(sampledCurve([500, 550, 650, 700], [0, 1, 0.6, 0]));
    // f_λ is drawn straight between points 0.1 nm apart: 1e-8 of itself.
    expect(syntheticAbMagnitude(flat, response)).toBeCloseTo(21.3, 7);
    expect(photonIntegral(response, flat) / photonsOfAbMagnitude(21.3, response)).toBeCloseTo(1, 7);
    expect(abMagnitudeOfPhotons(photonsOfAbMagnitude(21.3, response), response)).toBeCloseTo(21.3, 12);
    expect(syntheticAbMagnitude(sampledCurve([800, 900], [1, 1]), response)).toBeUndefined();
  });

  it('of a line is λ F S', () => {
    const response = responseOf(sampledCurve([500, 600], [0, 1]));
    expect(linePhotonIntegral(response, 550, 2)).toBeCloseTo(550 * 2 * 0.5, 12);
    expect(linePhotonIntegral(response, 610, 2)).toBe(0);
  });
});

describe('a magnitude at a wavelength', () => {
  it('is that of f_ν = λ² f_λ / c', () => {
    // AB = 0 is 3630.78 Jy: at 500 nm f_λ = 3.63078e-20 · c / λ² = 4.3540e-8 erg s⁻¹ cm⁻² nm⁻¹.
    const perNm = (3.630780547701e-20 * 2.99792458e17) / 500 ** 2;
    expect(abMagnitudeAt(perNm, 500)).toBeCloseTo(0, 11);
    expect(abMagnitudeOfFrequency(perNm * 500 ** 2)).toBeCloseTo(0, 11);
    expect(fluxPerNmOfAbMagnitude(0, 500) / perNm).toBeCloseTo(1, 11);
    expect(janskyOfFrequency(perNm * 500 ** 2)).toBeCloseTo(3630.780547701, 6);
  });
});

describe('a response', () => {
  it('that is a box has ln(λ₂/λ₁) and the pivot wavelength in closed form', () => {
    const { logIntegral, pivotWavelengthNm } = responseOf(boxCurve(400, 550));
    expect(logIntegral).toBeCloseTo(Math.log(550 / 400), 13);
    expect(pivotWavelengthNm).toBeCloseTo(Math.sqrt((550 ** 2 - 400 ** 2) / (2 * Math.log(550 / 400))), 10);
  });

  it('has its integrals by quadrature, and the same with jumps for walls', () => {
    const curve = sampledCurve([400, 400, 500, 500, 600, 600], [0, 1, 0.4, 0.8, 0.2, 0]);
    const { logIntegral, pivotWavelengthNm } = responseOf(curve);
    const of = (f: (nm: number) => number) => byQuadrature((nm) => f(nm) * curveValueAt(curve, nm), [curve, curve]);
    expect(logIntegral).toBeCloseTo(
      of((nm) => 1 / nm),
      12,
    );
    expect(pivotWavelengthNm).toBeCloseTo(Math.sqrt(of((nm) => nm) / of((nm) => 1 / nm)), 9);
  });

  it('is shared out between wavelengths', () => {
    const response = responseOf(sampledCurve([400, 500, 500, 600], [0, 1, 0.5, 0.5]));
    const low = responseShare(response, 0, 470);
    const high = responseShare(response, 470, Infinity);
    expect(low + high).toBeCloseTo(1, 13);
    expect(responseShare(response, 520, 580)).toBeCloseTo((0.5 * Math.log(580 / 520)) / response.logIntegral, 12);
    expect(responseShare(response, 700, 800)).toBe(0);
    expect(responseShare(response, 580, 520)).toBe(0);
  });

  it('of nothing is refused', () => {
    expect(() => responseOf(boxCurve(400, 500, 0))).toThrow(OutOfDomainError);
  });
});
