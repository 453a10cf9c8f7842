import { createCosmology } from '@faintward/cosmology';
import { OutOfDomainError } from '@faintward/photometry';
import { describe, expect, it } from 'vitest';
import { tabulatedDistances, targetDistance } from './distances.js';

const cosmology = createCosmology({ hubbleConstantKmSMpc: 70, omegaMatter: 0.3, omegaDarkEnergy: 0.6 });

describe('distances of a target', () => {
  it.each([0.01, 1, 7])('agree with the cosmology at z = %d, curvature included', (redshift) => {
    const distance = targetDistance(cosmology, redshift);
    expect(distance.distanceModulusMag).toBeCloseTo(cosmology.distanceModulusMag(redshift) ?? NaN, 10);
    expect(distance.kpcPerArcsec / (cosmology.kpcPerArcsec(redshift) ?? NaN)).toBeCloseTo(1, 11);
  });

  it.each([0.01, 1, 7])('from the table are those of the integration at z = %d', (redshift) => {
    const table = tabulatedDistances(cosmology);
    const ratio = table.luminosityDistanceMpc(redshift) / cosmology.luminosityDistanceMpc(redshift);
    expect(Math.abs(ratio - 1)).toBeLessThan(1e-9);
  });

  it('are refused where there is none', () => {
    expect(() => targetDistance(cosmology, 0)).toThrow(OutOfDomainError);
    expect(() => targetDistance({ luminosityDistanceMpc: () => NaN }, 1)).toThrow(OutOfDomainError);
  });
});
