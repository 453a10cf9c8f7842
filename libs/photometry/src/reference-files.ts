/** What the files of reference data must look like; kept out of the main entry because it brings the schema library. */
import { z } from 'zod';
import type { AtmosphereTable } from './atmosphere-data.js';
import type { BandsTable } from './bands.js';
import type { DustLawsTable } from './dust.js';
import type { IntergalacticTable } from './intergalactic-table.js';
import {
  AtmosphereData,
  BandsData,
  DustLawsData,
  intergalacticData,
  LinesData,
  FileProvenance,
  SpectrumData,
  SpectrumSeriesData,
  Text,
  TypicalValuesData,
} from './reference-schemas.js';
import { DarkSkyData, ExtinctionData, OhLinesData, SunlightData, TwilightData } from './sky-schemas.js';
import type { DarkSkyTable, ExtinctionTable, OhLinesTable, SunlightTable, TwilightTable } from './sky-tables.js';
import { SOURCE_TEMPLATE_FILE_NAMES, type ReferenceFile, type SourceTemplateFiles } from './sources/templates.js';
import { TYPICAL_VALUES_FILE_NAME, type TypicalValuesFile } from './typical-values.js';

/** The files that photometry and exposures calculate with, as parsed from JSON and checked. */
export interface PhotometryFiles extends SourceTemplateFiles {
  readonly intergalacticInoue2014: ReferenceFile<IntergalacticTable>;
  readonly intergalacticMadau1995: ReferenceFile<IntergalacticTable>;
  readonly dustLaws: ReferenceFile<DustLawsTable>;
  readonly bands: ReferenceFile<BandsTable>;
  readonly atmosphere: ReferenceFile<AtmosphereTable>;
  readonly typicalValues: TypicalValuesFile;
  readonly extinction: ReferenceFile<ExtinctionTable>;
  readonly darkSky: ReferenceFile<DarkSkyTable>;
  readonly sunlight: ReferenceFile<SunlightTable>;
  readonly twilight: ReferenceFile<TwilightTable>;
  readonly ohLines: ReferenceFile<OhLinesTable>;
}

/** Their names under `seed/reference`. */
export const PHOTOMETRY_FILE_NAMES: Readonly<Record<keyof PhotometryFiles, string>> = {
  ...SOURCE_TEMPLATE_FILE_NAMES,
  intergalacticInoue2014: 'igm-inoue2014.json',
  intergalacticMadau1995: 'igm-madau1995.json',
  dustLaws: 'dust-laws.json',
  bands: 'bands.json',
  atmosphere: 'atmosphere-windows.json',
  typicalValues: TYPICAL_VALUES_FILE_NAME,
  extinction: 'extinction-curves.json',
  darkSky: 'dark-sky.json',
  sunlight: 'sunlight.json',
  twilight: 'twilight.json',
  ohLines: 'oh-lines.json',
};

/** A file of reference data cannot be used. The message names the file, and the place in it where it has one. */
export class ReferenceFileError extends Error {
  override readonly name = 'ReferenceFileError';

  constructor(
    readonly file: string,
    readonly reason: string,
  ) {
    super(`Reference data ${file}: ${reason}`);
  }
}

/** What every file says about itself. */
const Meta = z.strictObject({
  title: Text,
  source: Text,
  licence: Text,
  units: Text,
  provenance: FileProvenance,
  notes: Text,
});
/** What a file says about itself. */
export type ReferenceMeta = z.output<typeof Meta>;

type DataSchemas = { readonly [Key in keyof PhotometryFiles]: z.ZodType<PhotometryFiles[Key]['data']> };

const DATA_SCHEMAS: DataSchemas = {
  quasarHewettWild2010: SpectrumData,
  supernovaIaHsiao: SpectrumSeriesData,
  intergalacticInoue2014: intergalacticData('inoue2014'),
  intergalacticMadau1995: intergalacticData('madau1995'),
  dustLaws: DustLawsData,
  bands: BandsData,
  lines: LinesData,
  atmosphere: AtmosphereData,
  typicalValues: TypicalValuesData,
  extinction: ExtinctionData,
  darkSky: DarkSkyData,
  sunlight: SunlightData,
  twilight: TwilightData,
  ohLines: OhLinesData,
};

/**
 * What a file of reference data says about itself; its data are not looked at.
 *
 * @throws {ReferenceFileError} if something is missing or unknown
 */
export function referenceMetaOf(file: string, content: unknown): ReferenceMeta {
  return parsed(file, z.strictObject({ meta: Meta, data: z.unknown() }), content).meta;
}

/**
 * The files of photometry, checked.
 *
 * @param contents  parsed JSON by file name; files that photometry does not know are passed over
 * @throws {ReferenceFileError} naming the first file that is missing or wrong
 */
export function photometryFilesFrom(contents: ReadonlyMap<string, unknown>): PhotometryFiles {
  const keys = Object.keys(PHOTOMETRY_FILE_NAMES) as (keyof PhotometryFiles)[];
  const files = keys.map((key) => {
    const file = PHOTOMETRY_FILE_NAMES[key];
    if (!contents.has(file)) throw new ReferenceFileError(file, 'is missing');
    return [key, parsed(file, z.strictObject({ meta: Meta, data: DATA_SCHEMAS[key] }), contents.get(file))];
  });
  return Object.fromEntries(files) as PhotometryFiles;
}

function parsed<Content>(file: string, schema: z.ZodType<Content>, content: unknown): Content {
  const result = schema.safeParse(content);
  if (result.success) return result.data;
  const { path, message } = result.error.issues[0]!;
  throw new ReferenceFileError(file, path.length === 0 ? message : `${path.join('.')}: ${message}`);
}
