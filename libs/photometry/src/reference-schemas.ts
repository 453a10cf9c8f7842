/** Schemas of the data of each reference file; what the numbers mean is said where the types are. */
import { z } from 'zod';
import { createAtmosphere, type AtmosphereTable } from './atmosphere-data.js';
import { BAND_IDS, createBands, type BandsTable } from './bands.js';
import { DUST_LAWS, type DustLaw, type DustLawsTable } from './dust.js';
import type { ContinuumBranch, IntergalacticTable, LineBranch } from './intergalactic-table.js';
import { createLines, LINE_IDS, type LinesTable } from './lines.js';
import { sampledCurve } from './sampled-curve.js';
import type { SpectrumSeriesTable, SpectrumTable } from './sources/templates.js';
import type { TypicalValues } from './typical-values.js';

export const Text = z.string().trim().min(1);
const Positive = z.number().positive();
export const Provenance = z.enum(['published', 'publishedFromMemory', 'commonPractice']);
/** `mixed`: the rows of a file differ, and each says for itself. */
export const FileProvenance = z.enum([...Provenance.options, 'mixed']);

const RatioBelow = Positive.nullable();
const LineBranchData = z.strictObject({
  ratioBelow: RatioBelow,
  power: z.number(),
  coefficients: z.array(z.number().nonnegative()),
});
const LineSeriesData = z.strictObject({ name: Text, branches: z.array(LineBranchData).min(1) });
const TermData = z.strictObject({ coefficient: z.number(), redshiftPower: z.number(), ratioPower: z.number() });
const ContinuumBranchData = z.strictObject({ ratioBelow: RatioBelow, terms: z.array(TermData).min(1) });
const EpochData = z.strictObject({ redshiftBelow: Positive.nullable(), branches: z.array(ContinuumBranchData).min(1) });

export function intergalacticData(id: IntergalacticTable['id']): z.ZodType<IntergalacticTable> {
  return z
    .strictObject({
      id: z.literal(id),
      lymanLimitNm: Positive,
      lineWavelengthsNm: z.array(Positive).min(1),
      lineSeries: z.array(LineSeriesData).min(1),
      continuum: z.array(z.strictObject({ name: Text, epochs: z.array(EpochData).min(1) })).min(1),
      metals: LineSeriesData.optional(),
    })
    .superRefine((table, context) => {
      const refuse = (message: string) => context.addIssue({ code: 'custom', message });
      const { lineWavelengthsNm: lines, lymanLimitNm } = table;
      if (!isAscending([lymanLimitNm, ...lines.toReversed()])) refuse('lines must descend and end above the limit');
      const series = table.metals ? [...table.lineSeries, table.metals] : table.lineSeries;
      for (const { name, branches } of series) {
        if (branches.some(({ coefficients }) => coefficients.length !== lines.length)) {
          refuse(`${name}: a coefficient for each of the ${lines.length} lines is needed`);
        }
        if (!areInOrder(branches)) refuse(`${name}: branches must ascend, and only the last is without a bound`);
      }
      for (const { name, epochs } of table.continuum) {
        if (!areBoundsInOrder(epochs.map(({ redshiftBelow }) => redshiftBelow))) refuse(`${name}: epochs must ascend`);
        if (!epochs.every(({ branches }) => areInOrder(branches))) refuse(`${name}: branches must ascend`);
      }
    });
}

function areInOrder(branches: readonly (LineBranch | ContinuumBranch)[]): boolean {
  return areBoundsInOrder(branches.map(({ ratioBelow }) => ratioBelow));
}

function areBoundsInOrder(bounds: readonly (number | null)[]): boolean {
  return (
    bounds.at(-1) === null &&
    isAscending(
      bounds
        .slice(0, -1)
        .map((bound) => bound ?? Infinity)
        .concat(Infinity),
    )
  );
}

function isAscending(values: readonly number[]): boolean {
  return values.every((value, i) => i === 0 || value > values[i - 1]!);
}

/** The schema with a check that throws: what it says becomes the issue. */
function checkedBy<Data>(schema: z.ZodType<Data>, check: (data: Data) => unknown): z.ZodType<Data> {
  return schema.superRefine((data, context) => {
    try {
      check(data);
    } catch (error) {
      context.addIssue({ code: 'custom', message: error instanceof Error ? error.message : String(error) });
    }
  });
}

const BandData = z.strictObject({
  id: z.enum(BAND_IDS),
  label: Text,
  vegaToAbMag: z.number().nullable(),
  vegaToAbProvenance: Provenance.nullable(),
  vegaToAbSource: Text.nullable(),
  curveProvenance: Provenance,
  curveSource: Text,
  wavelengthsNm: z.array(z.number()),
  response: z.array(z.number().max(1)),
});
const LineData = z.strictObject({
  id: z.enum(LINE_IDS),
  label: Text,
  vacuumWavelengthNm: Positive,
  spreadNm: z.number().nonnegative(),
  provenance: Provenance,
  source: Text,
});
const AtmosphericRangeData = z.strictObject({
  label: Text,
  kind: z.enum(['window', 'gap']),
  depth: z.enum(['partial', 'opaque']).optional(),
  lowNm: Positive,
  highNm: Positive,
});

const Numbers = z.array(z.number());
export const SpectrumData: z.ZodType<SpectrumTable> = checkedBy(
  z.strictObject({ wavelengthsNm: Numbers, fluxPerWavelength: Numbers }),
  ({ wavelengthsNm, fluxPerWavelength }) => sampledCurve(wavelengthsNm, fluxPerWavelength),
);
export const SpectrumSeriesData: z.ZodType<SpectrumSeriesTable> = checkedBy(
  z.strictObject({ phasesDays: Numbers.min(2), wavelengthsNm: Numbers, fluxPerWavelength: z.array(Numbers) }),
  ({ phasesDays, wavelengthsNm, fluxPerWavelength }) => {
    if (!isAscending(phasesDays)) throw new Error('phasesDays must ascend');
    if (fluxPerWavelength.length !== phasesDays.length)
      throw new Error('fluxPerWavelength must have a row for each phase');
    for (const row of fluxPerWavelength) sampledCurve(wavelengthsNm, row);
  },
);

export const BandsData: z.ZodType<BandsTable> = checkedBy(z.strictObject({ bands: z.array(BandData) }), (data) =>
  createBands({ data }),
);
export const LinesData: z.ZodType<LinesTable> = checkedBy(z.strictObject({ lines: z.array(LineData) }), (data) =>
  createLines({ data }),
);
export const AtmosphereData: z.ZodType<AtmosphereTable> = checkedBy(
  z.strictObject({ windows: z.array(AtmosphericRangeData) }),
  (data) => createAtmosphere({ data }),
);

const LawIds = Object.keys(DUST_LAWS) as DustLaw[];
/** The laws that the program has, each once: their coefficients stand with their formulas in the program. */
export const DustLawsData: z.ZodType<DustLawsTable> = z.strictObject({
  laws: z.array(z.enum(LawIds)).refine((laws) => laws.toSorted().join() === LawIds.toSorted().join(), {
    error: `must name each of ${LawIds.join(', ')} once`,
  }),
});

const sourced = { source: Text, provenance: Provenance };
const DerivedWith = z.strictObject({ presetId: Text, hubbleConstantKmSMpc: Positive, omegaMatter: Positive });
const LuminosityFunctionRows = z
  .array(
    z.strictObject({
      redshift: z.number().nonnegative(),
      magnitudeAb: z.number(),
      densityPerMpc3: Positive,
      faintEndSlope: z.number(),
    }),
  )
  .min(1)
  .refine((rows) => isAscending(rows.map(({ redshift }) => redshift)), { error: 'redshifts must ascend' });
const SizeRelation = z.strictObject({
  title: Text,
  sizeKpc: Positive,
  redshiftPower: z.number(),
  luminosityPower: z.number().optional(),
  atMagnitudeUvAb: z.number().optional(),
  massPower: z.number().optional(),
  atMassSolar: Positive.optional(),
  lowestMassSolar: Positive.optional(),
  lowestRedshift: z.number().nonnegative(),
  highestRedshift: Positive,
  axis: Text,
  sersicIndex: Positive.nullable(),
  spreadText: Text,
  ...sourced,
});

export const TypicalValuesData: z.ZodType<TypicalValues> = z.strictObject({
  ultravioletLuminosityFunction: z.strictObject({
    restWavelengthNm: Positive,
    derivedWith: DerivedWith,
    rows: LuminosityFunctionRows,
    beyond: z.strictObject({ derivedWith: DerivedWith, rows: LuminosityFunctionRows, ...sourced }),
    below: z.strictObject({ magnitudePerRedshift: z.number(), ...sourced }),
    ...sourced,
  }),
  ultravioletSlope: z.strictObject({
    slopeAt: z.number(),
    atMagnitudeAb: z.number(),
    slopePerMagnitude: z.number(),
    lowestRedshift: z.number().nonnegative(),
    highestRedshift: Positive,
    ...sourced,
  }),
  sizes: z.strictObject({
    shibuya2015: SizeRelation,
    vanDerWel2014Late: SizeRelation,
    vanDerWel2014Early: SizeRelation,
  }),
  lineWidths: z.array(
    z.strictObject({
      id: z.enum(['galaxyLineWidth', 'quasarLineWidth']),
      title: Text,
      velocityWidthKmS: Positive,
      spreadText: Text,
      provenance: Provenance,
    }),
  ),
  supernovaIa: z.strictObject({
    peakMagnitudeVega: z.number(),
    bandId: z.literal('B'),
    sigmaMag: Positive,
    spreadText: Text,
    derivedWith: DerivedWith,
    ...sourced,
  }),
});
