/** Schemas of the reference files of the sky; what the numbers mean is said in `sky-tables.ts`. */
import { z } from 'zod';
import { BAND_IDS } from './bands.js';
import { Provenance, Text } from './reference-schemas.js';
import type { DarkSkyTable, ExtinctionTable, OhLinesTable, SunlightTable, TwilightTable } from './sky-tables.js';

const Positive = z.number().positive();
const Wavelengths = z
  .array(Positive)
  .min(2)
  .refine((values) => values.every((value, i) => i === 0 || value > values[i - 1]!), { error: 'must ascend' });

/** Refuses an object whose lists are not of one length. */
function parallel<Shape extends { wavelengthsNm: readonly unknown[] }>(schema: z.ZodType<Shape>, other: keyof Shape) {
  return schema.refine((value) => (value[other] as readonly unknown[]).length === value.wavelengthsNm.length, {
    error: `a value for each wavelength is needed in ${String(other)}`,
  });
}

const CurvePoints = { wavelengthsNm: Wavelengths, magPerAirmass: z.array(Positive.max(5)) };
const ExtinctionCurveData = parallel(
  z.strictObject({ id: Text, label: Text, altitudeM: z.number(), source: Text, ...CurvePoints }),
  'magPerAirmass',
);

export const ExtinctionData: z.ZodType<ExtinctionTable> = z
  .strictObject({
    curves: z.array(ExtinctionCurveData).min(1),
    nearInfrared: parallel(z.strictObject({ source: Text, provenance: Provenance, ...CurvePoints }), 'magPerAirmass'),
  })
  .refine(({ curves }) => new Set(curves.map(({ id }) => id)).size === curves.length, { error: 'a curve stands twice' })
  .refine(
    ({ curves, nearInfrared }) => curves.every((each) => each.wavelengthsNm.at(-1)! < nearInfrared.wavelengthsNm[0]!),
    { error: 'nearInfrared must begin beyond the end of each curve' },
  );

const SurfaceMagnitude = z.number().min(0).max(40);

export const DarkSkyData: z.ZodType<DarkSkyTable> = z.strictObject({
  sets: z
    .array(
      z.strictObject({
        id: Text,
        label: Text,
        altitudeM: z.number().nullable(),
        solarFluxMjy: Positive.nullable(),
        provenance: Provenance,
        source: Text,
        rows: z
          .array(
            z.strictObject({
              bandId: z.enum(BAND_IDS),
              system: z.enum(['Vega', 'AB']),
              magPerArcsec2: SurfaceMagnitude,
            }),
          )
          .min(1),
      }),
    )
    .min(1),
});

export const SunlightData: z.ZodType<SunlightTable> = parallel(
  z.strictObject({
    wavelengthsNm: Wavelengths,
    absoluteMagnitudesAb: z.array(z.number()),
    moonReflectancePower: z.number(),
  }),
  'absoluteMagnitudesAb',
);

export const TwilightData: z.ZodType<TwilightTable> = z.strictObject({
  levelSunAltitudeDeg: z.number().negative(),
  rows: z
    .array(z.strictObject({ bandId: z.enum(BAND_IDS), magPerDegree: Positive, magPerArcsec2: SurfaceMagnitude }))
    .min(2),
});

export const OhLinesData: z.ZodType<OhLinesTable> = parallel(
  z.strictObject({ wavelengthsNm: Wavelengths, relativeIntensities: z.array(Positive.nullable()) }),
  'relativeIntensities',
);
