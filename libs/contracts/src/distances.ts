import { z } from 'zod';
import { Notice } from './common.js';
import { CosmologyChoice } from './cosmology.js';

/** Most redshifts one request may hold. */
export const MAX_REDSHIFT_COUNT = 100_000;

export const DistancesRequest = z
  .object({
    cosmology: CosmologyChoice.default('planck18'),
    redshifts: z
      .array(z.number({ error: 'A redshift is a number.' }))
      .min(1, { error: 'Give at least one redshift.' })
      .max(MAX_REDSHIFT_COUNT, { error: `At most ${MAX_REDSHIFT_COUNT} redshifts in one request.` }),
  })
  .meta({ id: 'DistancesRequest' });
export type DistancesRequest = z.output<typeof DistancesRequest>;

export const DistanceRow = z
  .object({
    redshift: z.number(),
    comovingDistanceMpc: z.number(),
    transverseComovingDistanceMpc: z.number(),
    angularDiameterDistanceMpc: z.number(),
    luminosityDistanceMpc: z.number(),
    /** Null at z = 0, where it has no value. */
    distanceModulusMag: z.number().nullable(),
    /** Proper kiloparsec that one arcsecond spans. */
    kpcPerArcsec: z.number(),
    /** Comoving volume of the whole sky out to this redshift. */
    comovingVolumeMpc3: z.number(),
    lookbackTimeGyr: z.number(),
    /** Null in a universe without a beginning. */
    ageGyr: z.number().nullable(),
    hubbleKmSMpc: z.number(),
    criticalDensityGCm3: z.number(),
    /** 10 log10(1+z): a line's or the bolometric surface brightness, in energy. */
    bolometricDimmingMag: z.number(),
    /** 7.5 log10(1+z): per unit frequency, as AB magnitudes are. */
    perFrequencyDimmingMag: z.number(),
    /** 12.5 log10(1+z): per unit wavelength. */
    perWavelengthDimmingMag: z.number(),
    /** 7.5 log10(1+z): photons of a line or of the whole spectrum. */
    photonRateDimmingMag: z.number(),
  })
  .meta({ id: 'DistanceRow' });
export type DistanceRow = z.infer<typeof DistanceRow>;

export const DistancesResponse = z
  .object({
    cosmology: z.object({ id: z.string(), title: z.string(), source: z.string().nullable() }),
    engineVersion: z.string(),
    notices: z.array(Notice),
    rows: z.array(DistanceRow),
  })
  .meta({ id: 'DistancesResponse' });
export type DistancesResponse = z.infer<typeof DistancesResponse>;
