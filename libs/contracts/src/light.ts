import { z } from 'zod';

/** Bands a brightness may be quoted in. Curves come with the instruments; these are names with a pivot wavelength. */
export const BandId = z.enum(['U', 'B', 'V', 'R', 'I', 'u', 'g', 'r', 'i', 'z', 'Y', 'J', 'H', 'Ks']);
export type BandId = z.infer<typeof BandId>;

export const MagnitudeSystem = z.enum(['AB', 'Vega']);
export type MagnitudeSystem = z.infer<typeof MagnitudeSystem>;

const magnitude = z.number({ error: 'A magnitude is a number.' }).min(-60).max(60);
/** Slope β of f_λ ∝ λ^β; −2 is flat per unit frequency. */
const spectralSlopeBeta = z.number().min(-10).max(10).default(-2);
const restWavelengthNm = z.number().min(1).max(1e6);
const velocityWidthKmS = z.number().min(0).max(30_000).default(200);
/** Uncertainty of the brightness, 1 σ in magnitudes. */
const sigmaMag = z.number().min(0).max(5).optional();

/** How bright a target is, said in the terms the investigator knows. */
export const Light = z
  .discriminatedUnion('kind', [
    z.object({
      kind: z.literal('apparentMagnitude'),
      magnitude,
      system: MagnitudeSystem.default('AB'),
      bandId: BandId,
      spectralSlopeBeta,
      sigmaMag,
    }),
    z.object({
      kind: z.literal('absoluteMagnitude'),
      magnitudeAb: magnitude,
      /** Rest wavelength the magnitude belongs to; 150 nm for M_UV. */
      restWavelengthNm: restWavelengthNm.default(150),
      spectralSlopeBeta,
      sigmaMag,
    }),
    z.object({
      kind: z.literal('lineFlux'),
      fluxErgSCm2: z.number().gt(0).max(1),
      restWavelengthNm,
      velocityWidthKmS,
      sigmaMag,
    }),
    z.object({
      kind: z.literal('lineLuminosity'),
      luminosityErgS: z.number().gt(0).max(1e60),
      restWavelengthNm,
      velocityWidthKmS,
      sigmaMag,
    }),
  ])
  .meta({ id: 'Light' });
export type Light = z.infer<typeof Light>;

/** How large a target is. */
export const Extent = z
  .discriminatedUnion('kind', [
    z.object({ kind: z.literal('point') }),
    z.object({
      kind: z.literal('sersic'),
      halfLightRadius: z.number().gt(0).max(10_000),
      unit: z.enum(['kpc', 'arcsec']),
      sersicIndex: z.number().min(0.3).max(8).default(1),
      axisRatio: z.number().gt(0).max(1).default(1),
    }),
    /** A surface of even brightness: the magnitude is then per square arcsecond. */
    z.object({ kind: z.literal('uniform') }),
  ])
  .meta({ id: 'Extent' });
export type Extent = z.infer<typeof Extent>;
