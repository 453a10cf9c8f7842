import { OutOfDomainError } from '../domain.js';
import { createLines, type LineId, type LinesTable, type SpectralLine } from '../lines.js';
import type { FileProvenance } from '../provenance.js';
import { sampledCurve, type SampledCurve } from '../sampled-curve.js';

/** A file of reference data: what it is and whose, and the numbers. */
export interface ReferenceFile<Data> {
  readonly meta: {
    readonly title: string;
    readonly source: string;
    readonly licence: string;
    readonly units: string;
    readonly provenance: FileProvenance;
    readonly notes: string;
  };
  readonly data: Data;
}

/** Data of a file with one spectrum: f_λ on any scale. */
export interface SpectrumTable {
  readonly wavelengthsNm: readonly number[];
  readonly fluxPerWavelength: readonly number[];
}

/** Data of a file with spectra by phase, on one scale. */
export interface SpectrumSeriesTable {
  /** Rest-frame days from the maximum in B, ascending. */
  readonly phasesDays: readonly number[];
  readonly wavelengthsNm: readonly number[];
  /** A row for each phase. */
  readonly fluxPerWavelength: readonly (readonly number[])[];
}

/** The files that spectra are made from, as parsed from JSON, under `seed/reference`. */
export interface SourceTemplateFiles {
  readonly quasarHewettWild2010: ReferenceFile<SpectrumTable>;
  readonly supernovaIaHsiao: ReferenceFile<SpectrumSeriesTable>;
  readonly lines: ReferenceFile<LinesTable>;
}

/** Their names. */
export const SOURCE_TEMPLATE_FILE_NAMES: Readonly<Record<keyof SourceTemplateFiles, string>> = {
  quasarHewettWild2010: 'template-quasar-hewett-wild-2010.json',
  supernovaIaHsiao: 'template-supernova-ia-hsiao.json',
  lines: 'lines.json',
};

/** Every line by its id. */
export type SpectralLines = Readonly<Record<LineId, SpectralLine>>;

/** A published spectrum. */
export interface SpectrumTemplate {
  readonly source: string;
  readonly provenance: FileProvenance;
  readonly curve: SampledCurve;
}

/** Published spectra by phase. */
export interface SpectrumSeries {
  readonly source: string;
  readonly provenance: FileProvenance;
  /** At least two, ascending; a curve for each, on the same wavelengths and one scale. */
  readonly phasesDays: readonly number[];
  readonly curves: readonly SampledCurve[];
}

/** What spectra are made from beside a person's parameters. */
export interface SourceTemplates {
  readonly quasarHewettWild2010: SpectrumTemplate;
  readonly supernovaIaHsiao: SpectrumSeries;
  readonly lines: SpectralLines;
}

/**
 * Templates from their files, checked.
 *
 * @throws {OutOfDomainError} naming the first number that cannot be
 */
export function sourceTemplates(files: SourceTemplateFiles): SourceTemplates {
  const { meta, data } = files.quasarHewettWild2010;
  return {
    quasarHewettWild2010: {
      source: meta.source,
      provenance: meta.provenance,
      curve: sampledCurve(data.wavelengthsNm, data.fluxPerWavelength),
    },
    supernovaIaHsiao: series(files.supernovaIaHsiao),
    lines: Object.fromEntries(createLines(files.lines).map((line) => [line.id, line])) as SpectralLines,
  };
}

function series({ meta, data }: ReferenceFile<SpectrumSeriesTable>): SpectrumSeries {
  const { phasesDays, wavelengthsNm, fluxPerWavelength } = data;
  if (phasesDays.length < 2 || phasesDays.length !== fluxPerWavelength.length) {
    throw new OutOfDomainError('phasesDays.length', phasesDays.length, 'at least 2, one for each row of fluxes');
  }
  const fall = phasesDays.findIndex((phase, i) => !Number.isFinite(phase) || (i > 0 && phase <= phasesDays[i - 1]!));
  if (fall !== -1) throw new OutOfDomainError(`phasesDays.${fall}`, phasesDays[fall], 'finite and ascending');
  return {
    source: meta.source,
    provenance: meta.provenance,
    phasesDays,
    curves: fluxPerWavelength.map((row) => sampledCurve(wavelengthsNm, row)),
  };
}
