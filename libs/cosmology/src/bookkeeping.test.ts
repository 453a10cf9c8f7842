import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { convertAbsoluteMagnitude, distanceModulusDifferenceMag } from './comparison.js';
import { MEGAPARSEC, NEUTRINO_DENSITY_RATIO, STEFAN_BOLTZMANN } from './constants.js';
import { createCosmology } from './cosmology.js';
import { OutOfDomainError } from './errors.js';
import { COSMOLOGY_PRESETS, isCosmologyPresetId } from './presets/index.js';
import {
  combineRedshifts,
  distanceModulusScatterMag,
  luminosityDistanceWithFramesMpc,
  removeRedshifts,
} from './redshift.js';
import { cosmologyWarnings, redshiftWarnings } from './warnings.js';

describe('constants', () => {
  it('have the values published with 10 and more digits', () => {
    // IAU 2015 Resolution B2: 1 pc = 3.085677581491367e16 m; CODATA 2018: σ = 5.670374419…e-8.
    expect(MEGAPARSEC.value / 3.085677581491367e19).toBeCloseTo(1, 15);
    expect(STEFAN_BOLTZMANN.value / 5.670374419e-8).toBeCloseTo(1, 9);
    expect(NEUTRINO_DENSITY_RATIO.value).toBeCloseTo(0.22710731766, 11);
  });
});

describe('redshifts of moving sources', () => {
  it('multiply', () => {
    expect(combineRedshifts(1, 0.5)).toBe(2);
    expect(combineRedshifts(1e-15, 1e-15)).toBeCloseTo(2e-15, 25);
    expect(combineRedshifts()).toBe(0);
  });

  it('come apart again', () => {
    const part = fc.double({ min: -0.01, max: 0.01, noNaN: true });
    fc.assert(
      fc.property(fc.double({ min: 0, max: 10, noNaN: true }), part, part, (cosmological, peculiar, observer) => {
        const observed = combineRedshifts(cosmological, peculiar, observer);
        expect(removeRedshifts(observed, peculiar, observer)).toBeCloseTo(cosmological, 12);
      }),
    );
  });

  it('must be above −1', () => {
    for (const bad of [-1, -2, NaN, Infinity]) {
      expect(() => combineRedshifts(0.1, bad)).toThrow(OutOfDomainError);
      expect(() => removeRedshifts(bad, 0.1)).toThrow(OutOfDomainError);
    }
  });

  it('scatter of 300 km/s blurs the modulus by 0.217 mag at z = 0.01 and 0.022 mag at z = 0.1', () => {
    const model = createCosmology('planck18');
    // (5/ln 10) · 300/(c z), the limit of small z.
    expect(distanceModulusScatterMag(model, 0.01, 300)).toBeCloseTo(0.217, 2);
    expect(distanceModulusScatterMag(model, 0.1, 300)).toBeCloseTo(0.0217, 2);
    // Where (1+z) matters: a velocity v in the source's frame shifts the observed redshift by (1+z) v/c.
    const shift = (1 + 3) * (300 / 299_792.458);
    const [near, far] = [model.distanceModulusMag(3 - shift), model.distanceModulusMag(3 + shift)];
    expect(distanceModulusScatterMag(model, 3, 300)).toBeCloseTo((far! - near!) / 2, 8);
    expect(distanceModulusScatterMag(model, 0, 300)).toBeUndefined();
    expect(() => distanceModulusScatterMag(model, 1, -1)).toThrow(OutOfDomainError);
  });

  it('in two frames split the luminosity distance', () => {
    const model = createCosmology('conv70');
    expect(luminosityDistanceWithFramesMpc(model, 0.05, 0.05)).toBe(model.luminosityDistanceMpc(0.05));
    const shifted = luminosityDistanceWithFramesMpc(model, 0.05, 0.051);
    expect(shifted / model.luminosityDistanceMpc(0.05)).toBeCloseTo(1.051 / 1.05, 14);
    expect(() => luminosityDistanceWithFramesMpc(model, 0.05, -1)).toThrow(OutOfDomainError);
  });
});

describe('two cosmologies', () => {
  it('differ in modulus as their distances do, with a limit at zero', () => {
    const planck = createCosmology('planck18');
    const ladder = createCosmology('ladder73');
    const difference = ladder.distanceModulusMag(7)! - planck.distanceModulusMag(7)!;
    expect(distanceModulusDifferenceMag(ladder, planck, 7)).toBeCloseTo(difference, 12);
    expect(distanceModulusDifferenceMag(ladder, planck, 0)).toBeCloseTo(5 * Math.log10(67.66 / 73.04), 12);
    expect(distanceModulusDifferenceMag(ladder, planck, 1e-9)).toBeCloseTo(5 * Math.log10(67.66 / 73.04), 8);
  });

  it('give the same apparent magnitude after conversion', () => {
    const from = createCosmology('conv70');
    const to = createCosmology('planck18');
    const converted = convertAbsoluteMagnitude(-21, from, to, 3);
    expect(converted + to.distanceModulusMag(3)!).toBeCloseTo(-21 + from.distanceModulusMag(3)!, 12);
  });
});

describe('presets by name', () => {
  it('are told from other text', () => {
    for (const id of Object.keys(COSMOLOGY_PRESETS)) expect(isCosmologyPresetId(id)).toBe(true);
    for (const id of ['', 'toString', 'Planck18']) expect(isCosmologyPresetId(id)).toBe(false);
  });
});

describe('warnings', () => {
  const base = { hubbleConstantKmSMpc: 70, omegaMatter: 0.3 };
  const codes = (change: object): string[] => cosmologyWarnings({ ...base, ...change }).map((warning) => warning.code);

  it('are absent for every preset', () => {
    for (const preset of Object.values(COSMOLOGY_PRESETS)) expect(cosmologyWarnings(preset.parameters)).toEqual([]);
  });

  it('name each unusual thing', () => {
    expect(codes({ hubbleConstantKmSMpc: 39 })).toEqual(['unusual-hubble-constant']);
    expect(codes({ hubbleConstantKmSMpc: 40 })).toEqual([]);
    expect(codes({ w0: -0.9, wa: 0.9 })).toEqual(['early-dark-energy']);
    expect(codes({ w0: -0.9, wa: 0.8 })).toEqual([]);
    expect(codes({ omegaDarkEnergy: 0.5 })).toEqual(['strong-curvature']);
    expect(codes({ omegaMatter: 0.2, omegaDarkEnergy: 1.5 })).toEqual([
      'strong-curvature',
      'closed-universe-turns-back',
    ]);
    expect(codes({ cmbTemperatureK: 2.7255 })).toEqual(['no-neutrinos']);
    expect(codes({ effectiveNeutrinoCount: 3 })).toEqual(['neutrinos-without-effect']);
    expect(codes({ cmbTemperatureK: 2.7, neutrinoMassesEv: [0.1] })).toEqual([
      'no-neutrinos',
      'neutrinos-without-effect',
    ]);
  });

  it('remark on redshifts beyond every known source', () => {
    expect(redshiftWarnings(30)).toEqual([]);
    expect(redshiftWarnings(30.1).map((warning) => warning.code)).toEqual(['redshift-beyond-known-sources']);
  });
});
