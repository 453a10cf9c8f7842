import { DistancesRequest } from '@faintward/contracts/distances';
import { EstimateRequest } from '@faintward/contracts/estimates';
import { describe, expect, it } from 'vitest';
import { fieldErrorsOf } from '../../../apps/api/src/platform/validation.js';

function pathsOf(schema: typeof DistancesRequest | typeof EstimateRequest, value: unknown): string[] {
  const parsed = schema.safeParse(value);
  return parsed.success ? [] : fieldErrorsOf(parsed.error).map(({ path }) => path);
}

describe('field errors', () => {
  it('name the faulty parameter of a cosmology, not the cosmology', () => {
    const cosmology = { hubbleConstantKmSMpc: 'fast', omegaMatter: 0.3 };
    expect(pathsOf(DistancesRequest, { cosmology, redshifts: [1] })).toEqual(['cosmology.hubbleConstantKmSMpc']);
  });

  it('name the whole value where it fits no shape at all', () => {
    expect(pathsOf(DistancesRequest, { cosmology: 'planck21', redshifts: [1] })).toEqual(['cosmology']);
  });

  it('name the faulty number of a setup that is typed in full', () => {
    const request = {
      target: { redshift: 1, light: { kind: 'apparentMagnitude', magnitude: 24, bandId: 'i' } },
      setup: {
        telescope: { diameterM: 5, obstructionDiameterM: 1 },
        site: { zenithSeeingArcsec: 0.8 },
        mode: { kind: 'imaging', throughput: 3 },
      },
      goal: { kind: 'signalToNoise', value: 5, per: 'aperture' },
      conditions: { seeingArcsec: 0.8, airmass: 1, moonClass: 'dark', transparency: 'clear' },
    };
    const paths = pathsOf(EstimateRequest, request);
    expect(paths).toContain('setup.mode.throughput');
    expect(paths).not.toContain('setup.modeId');
  });

  it('name the index of a redshift in the list', () => {
    expect(pathsOf(DistancesRequest, { redshifts: [1, 2, 'three'] })).toEqual(['redshifts.2']);
  });
});
