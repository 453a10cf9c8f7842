import { z } from 'zod';
import { Id, Instant, ListQuery, Notice, Version, line, pageOf, prose } from './common.js';
import { BandId, Extent, Light, MagnitudeSystem, RedshiftKind, RedshiftUncertainty } from './light.js';

/** Most targets one proposal may hold. */
export const MAX_TARGET_COUNT = 20_000;
/** Longest table text that may be pasted or uploaded, in characters. */
export const MAX_IMPORT_CHARACTERS = 20_000_000;

const redshift = z
  .number({ error: 'A redshift is a number.' })
  .min(0, { error: 'A redshift below 0 (a blueshift) has no distance. Give 0 or more.' })
  .max(30, { error: 'Redshifts up to 30 are accepted for sources.' });

export const TargetInput = z
  .object({
    name: line(80),
    rightAscensionDeg: z
      .number()
      .min(0, { error: 'Right ascension runs from 0° to 360°.' })
      .lt(360, { error: 'Right ascension runs from 0° to 360°.' }),
    declinationDeg: z
      .number()
      .min(-90, { error: 'Declination runs from −90° to +90°.' })
      .max(90, { error: 'Declination runs from −90° to +90°.' }),
    redshift,
    redshiftUncertainty: RedshiftUncertainty.nullable(),
    redshiftKind: RedshiftKind,
    light: Light.nullable(),
    extent: Extent,
    notes: prose(2000),
  })
  .meta({ id: 'TargetInput' });
export type TargetInput = z.output<typeof TargetInput>;

/** Texts as typed in a cell; the server reads them and says what is wrong with which. */
export const TargetCells = z
  .object({
    name: z.string().max(500),
    /** Any usual notation: `03h55m04.9s`, `58.7704`, `3 55 04.9`. */
    rightAscension: z.string().max(200),
    declination: z.string().max(200),
    redshift: z.string().max(100),
    /** `0.02`, `+0.05 -0.03`, or empty. */
    redshiftUncertainty: z.string().max(100),
    /** With its unit, typed freely: `24.1 mag`, `12 uJy`, `2e-17 erg/s/cm^2`; a bare number is an AB magnitude in the chosen band. */
    brightness: z.string().max(200),
    notes: z.string().max(2000),
  })
  .partial()
  .meta({ id: 'TargetCells' });
export type TargetCells = z.output<typeof TargetCells>;

export const TargetPatch = TargetInput.partial().extend({ cells: TargetCells.optional() }).meta({ id: 'TargetPatch' });
export type TargetPatch = z.output<typeof TargetPatch>;

export const NewTarget = TargetInput.partial().extend({ cells: TargetCells.optional() }).meta({ id: 'NewTarget' });
export type NewTarget = z.output<typeof NewTarget>;

/** What the server works out for a target. Null where there is nothing to say (no brightness, z = 0). */
export const TargetComputed = z
  .object({
    luminosityDistanceMpc: z.number().nullable(),
    angularDiameterDistanceMpc: z.number().nullable(),
    distanceModulusMag: z.number().nullable(),
    kpcPerArcsec: z.number().nullable(),
    ageGyr: z.number().nullable(),
    lookbackTimeGyr: z.number().nullable(),
    perFrequencyDimmingMag: z.number().nullable(),
    bolometricDimmingMag: z.number().nullable(),
    /** AB magnitude at the band or wavelength given in `magnitudeLabel`. */
    apparentMagnitudeAb: z.number().nullable(),
    magnitudeLabel: z.string().nullable(),
    absoluteMagnitudeAb: z.number().nullable(),
    /** Above the atmosphere; null in a band without light, absent from a light that is a line or a surface. */
    bandMagnitudesAb: z.partialRecord(BandId, z.number().nullable()),
    /** Of a light that is a line. */
    lineObservedWavelengthNm: z.number().nullable(),
    lineFluxErgSCm2: z.number().nullable(),
    halfLightRadiusArcsec: z.number().nullable(),
    surfaceBrightnessAbMagPerArcsec2: z.number().nullable(),
    /** Months in which the target is up long enough: "Oct–Jan", "never", "all semester". */
    upSummary: z.string().nullable(),
    upHoursByMonth: z.array(z.object({ month: z.string(), hoursPerNight: z.number() })),
    notices: z.array(Notice),
    cosmologyId: z.string(),
    engineVersion: z.string(),
    referenceDataVersion: z.string(),
    inputHash: z.string(),
  })
  .meta({ id: 'TargetComputed' });
export type TargetComputed = z.infer<typeof TargetComputed>;

export const Target = z
  .object({
    targetId: Id,
    position: z.int(),
    name: z.string(),
    rightAscensionDeg: z.number(),
    declinationDeg: z.number(),
    /** Sexagesimal, as the grid shows it. */
    rightAscensionText: z.string(),
    declinationText: z.string(),
    redshift: z.number(),
    redshiftUncertainty: RedshiftUncertainty.nullable(),
    /** As the grid shows and takes it: `0.02`, `+0.05 −0.03`, `p(z), 2 peaks`. */
    redshiftUncertaintyText: z.string(),
    redshiftKind: RedshiftKind,
    light: Light.nullable(),
    /** The brightness as the grid shows and takes it: "24.10 AB (J)". */
    brightnessText: z.string(),
    extent: Extent,
    notes: z.string(),
    computed: TargetComputed,
    observationCount: z.int(),
    /** Sum over its observations, overheads included; null without a feasible observation. */
    requestedSeconds: z.number().nullable(),
    version: Version,
    updatedAt: Instant,
  })
  .meta({ id: 'Target' });
export type Target = z.infer<typeof Target>;
export const TargetPage = pageOf(Target).meta({ id: 'TargetPage' });

export const TargetSort = z.enum([
  'position',
  'name',
  'rightAscensionDeg',
  'declinationDeg',
  'redshift',
  'apparentMagnitudeAb',
  'luminosityDistanceMpc',
  'ageGyr',
  'requestedSeconds',
]);
export const TargetListQuery = ListQuery.extend({
  sort: TargetSort.default('position'),
  /** Only targets that carry a notice. */
  withNotices: z.stringbool().optional(),
});
export type TargetListQuery = z.output<typeof TargetListQuery>;

/** One disc on the strip of cosmic time. Ages come from the server: the web computes no cosmology. */
export const CosmicTimePoint = z.object({
  targetId: Id,
  name: z.string(),
  redshift: z.number(),
  ageGyr: z.number(),
  hours: z.number().nullable(),
});
export const CosmicTime = z
  .object({
    points: z.array(CosmicTimePoint),
    /** Ticks of the axis: redshift with the age it belongs to in this proposal's cosmology. */
    ticks: z.array(z.object({ redshift: z.number(), ageGyr: z.number() })),
    /** Ticks at round ages of the universe, with the redshift each belongs to; the youngest first. */
    ageTicks: z.array(z.object({ ageGyr: z.number(), redshift: z.number() })),
    ageTodayGyr: z.number(),
  })
  .meta({ id: 'CosmicTime' });
export type CosmicTime = z.infer<typeof CosmicTime>;

export const RemoveTargets = z
  .object({ targetIds: z.array(Id).min(1).max(MAX_TARGET_COUNT) })
  .meta({ id: 'RemoveTargets' });
export type RemoveTargets = z.output<typeof RemoveTargets>;
export const RemovedTargets = z.object({ removedCount: z.int() }).meta({ id: 'RemovedTargets' });

/* ---- Import ---- */

export const ImportRole = z.enum([
  'name',
  'rightAscension',
  'declination',
  'redshift',
  'redshiftUncertainty',
  'brightness',
  'notes',
  'ignore',
]);
export type ImportRole = z.infer<typeof ImportRole>;

export const ImportOptions = z.object({
  /** For each column of the text, in order; absent: guess. */
  roles: z.array(ImportRole).max(500).optional(),
  hasHeader: z.boolean().optional(),
  /** What a bare number in the brightness column means. */
  brightnessBandId: BandId.default('V'),
  brightnessSystem: MagnitudeSystem.default('AB'),
  /** Targets of this list with the same name and place within 2″ are left as they are. */
  skipDuplicates: z.boolean().default(false),
});

export const ImportRequest = z
  .object({
    text: z.string().max(MAX_IMPORT_CHARACTERS, { error: 'This table is too long: at most 20 million characters.' }),
    options: ImportOptions.prefault({}),
  })
  .meta({ id: 'ImportRequest' });
export type ImportRequest = z.output<typeof ImportRequest>;

export const ImportCell = z.object({
  text: z.string(),
  /** Why this cell cannot be used, and what would be right. */
  error: z.string().optional(),
  warning: z.string().optional(),
});

export const ImportPreview = z
  .object({
    columns: z.array(z.object({ header: z.string(), role: ImportRole })),
    delimiter: z.string(),
    hasHeader: z.boolean(),
    rowCount: z.int(),
    readyCount: z.int(),
    faultyCount: z.int(),
    duplicateCount: z.int(),
    /** The first rows and every faulty row, up to 500. */
    rows: z.array(
      z.object({
        /** Line number in the text, from 1. */
        lineNumber: z.int(),
        cells: z.array(ImportCell),
        isReady: z.boolean(),
        rowErrors: z.array(z.string()),
        isDuplicate: z.boolean(),
      }),
    ),
    /** What is wrong with the table as a whole: a role that no column has, two columns with one role. */
    tableErrors: z.array(z.string()),
  })
  .meta({ id: 'ImportPreview' });
export type ImportPreview = z.infer<typeof ImportPreview>;

export const ImportResult = z
  .object({ importedCount: z.int(), skippedFaultyCount: z.int(), skippedDuplicateCount: z.int(), targetCount: z.int() })
  .meta({ id: 'ImportResult' });
export type ImportResult = z.infer<typeof ImportResult>;
