/** Spectra of sources in their rest frame, on one grid of wavelengths, without anything that lies on the way. */
import { blackbodySpectrum, type BlackbodySource } from './sources/blackbody.js';
import { passiveSpectrum, type PassiveSource } from './sources/passive.js';
import { powerLawSpectrum, type PowerLawSource } from './sources/power-law.js';
import { quasarSpectrum, type QuasarSource } from './sources/quasar.js';
import type { RestSpectrum } from './sources/rest-spectrum.js';
import { sampledSpectrum, type SampledSource } from './sources/sampled.js';
import { starFormingSpectrum, type StarFormingSource } from './sources/star-forming.js';
import { supernovaIaSpectrum, type SupernovaIaSource } from './sources/supernova.js';
import type { SourceTemplates } from './sources/templates.js';

export { powerLawSpectrum } from './sources/power-law.js';
export { BOLTZMANN_CONSTANT } from './sources/blackbody.js';
export { NARROW_LINE_WIDTH_KM_S } from './sources/rest-spectrum.js';
export type { RestLine, RestSpectrum, SpectrumCaution } from './sources/rest-spectrum.js';
export type { SampledSource } from './sources/sampled.js';
export { supernovaPhaseMag } from './sources/supernova.js';
export { SOURCE_TEMPLATE_FILE_NAMES, sourceTemplates } from './sources/templates.js';
export type { ReferenceFile, SourceTemplateFiles, SourceTemplates } from './sources/templates.js';

/** A kind of source with its parameters. */
export type SourceKind =
  | PowerLawSource
  | StarFormingSource
  | PassiveSource
  | QuasarSource
  | SupernovaIaSource
  | BlackbodySource
  | SampledSource;

/**
 * The spectrum of a kind of source. Some milliseconds; keep it for as long as the kind and the jumps stay the same.
 *
 * @param jumpsNm  rest wavelengths at which what is applied later jumps (Lyman lines and limit): these nodes stand twice
 * @throws {OutOfDomainError} naming the parameter that cannot be
 */
export function restSpectrum(
  kind: SourceKind,
  templates: SourceTemplates,
  jumpsNm: readonly number[] = [],
): RestSpectrum {
  switch (kind.kind) {
    case 'powerLaw':
      return powerLawSpectrum(kind, jumpsNm);
    case 'starForming':
      return starFormingSpectrum(kind, templates, jumpsNm);
    case 'passive':
      return passiveSpectrum(jumpsNm);
    case 'quasar':
      return quasarSpectrum(kind, templates, jumpsNm);
    case 'supernovaIa':
      return supernovaIaSpectrum(kind, templates, jumpsNm);
    case 'blackbody':
      return blackbodySpectrum(kind, jumpsNm);
    case 'sampled':
      return sampledSpectrum(kind, jumpsNm);
  }
}
