import type { CosmologyPresetId } from '@faintward/contracts/cosmology';
import type { Extent, Light, RedshiftKind, RedshiftUncertainty } from '@faintward/contracts/light';
import type { LightSuggestion } from '@faintward/contracts/light-report';
import { counted, formatNumber } from '../../lib/format';
import type { LightDraft } from './lightDraft';

/** A choice: what it is called in a form. */
export type Options<Value extends string = string> = readonly (readonly [value: Value, label: string])[];

export const kindOptions: Options<LightDraft['light']> = [
  ['none', 'nothing yet'],
  ['apparentMagnitude', 'apparent magnitude in a band'],
  ['absoluteMagnitude', 'absolute magnitude'],
  ['lineFlux', 'flux of a line'],
  ['lineLuminosity', 'luminosity of a line'],
  ['starFormationRate', 'star-formation rate'],
  ['typical', 'only its kind: a typical brightness (suggestion)'],
];

export const spectrumOptions: Options<LightDraft['spectrum']> = [
  ['powerLaw', 'power law'],
  ['starForming', 'star-forming galaxy'],
  ['passive', 'passive galaxy'],
  ['quasar', 'quasar'],
  ['supernovaIa', 'type Ia supernova'],
  ['blackbody', 'blackbody'],
  ['uploaded', 'a spectrum of ours…'],
];

const cosmologyTitles: Record<CosmologyPresetId, string> = {
  planck18: 'Planck 2018',
  planck15: 'Planck 2015',
  wmap9: 'WMAP nine-year',
  conv70: 'conventional 70 / 0.3',
  ladder73: 'distance ladder, H₀ 73',
};
export const cosmologyOptions = Object.entries(cosmologyTitles) as unknown as Options<CosmologyPresetId>;

export const dustLawOptions: Options<LightDraft['hostLaw']> = [
  ['calzetti2000', 'Calzetti 2000, starbursts'],
  ['ccm1989', 'Cardelli et al. 1989'],
  ['fitzpatrick1999', 'Fitzpatrick 1999'],
];

export const intergalacticOptions: Options<LightDraft['intergalactic']> = [
  ['inoue2014', 'Inoue et al. 2014'],
  ['madau1995', 'Madau 1995'],
  ['none', 'none: fully transparent'],
];

export const calibrationOptions: Options<LightDraft['calibration']> = [
  ['kennicuttEvans2012', 'Kennicutt & Evans 2012'],
  ['kennicutt1998', 'Kennicutt 1998'],
  ['madauDickinson2014', 'Madau & Dickinson 2014'],
];

export const tracerOptions: Options<LightDraft['tracer']> = [
  ['ultraviolet', 'ultraviolet continuum'],
  ['hydrogenAlpha', 'Hα'],
  ['lymanAlpha', 'Lyα'],
];

export const extentOptions: Options<LightDraft['extent']> = [
  ['point', 'point'],
  ['sersic', 'galaxy with a Sérsic profile'],
  ['typical', 'galaxy of a typical size (suggestion)'],
  ['uniform', 'surface of even brightness: the magnitude is per square arcsecond'],
];

export const relationOptions: Options<LightDraft['relation']> = [
  ['shibuya2015', 'Shibuya et al. 2015, ultraviolet'],
  ['vanDerWel2014Late', 'van der Wel et al. 2014, late types'],
  ['vanDerWel2014Early', 'van der Wel et al. 2014, early types'],
];

export const redshiftKindOptions: Options<RedshiftKind> = [
  ['spectroscopic', 'spectroscopic'],
  ['photometric', 'photometric'],
  ['assumed', 'assumed'],
];

export const provenanceWords: Record<LightSuggestion['provenance'], string> = {
  published: 'published',
  publishedFromMemory: 'published, quoted from memory',
  commonPractice: 'common practice',
};

const figures = (value: number) => formatNumber(value, { significant: 3 });

/** A light in a few words, for a line that compares two. */
export function describeLight(light: Light | null): string {
  if (light === null) return 'nothing yet';
  const sigma = light.sigmaMag === undefined ? '' : ` ± ${figures(light.sigmaMag)} mag`;
  return `${describeValue(light)}${sigma}`;
}

function describeValue(light: Light): string {
  switch (light.kind) {
    case 'apparentMagnitude':
      return `${formatNumber(light.magnitude, { decimals: 2 })} ${light.system} (${light.bandId})`;
    case 'absoluteMagnitude': {
      const where = light.restBandId ?? `${formatNumber(light.restWavelengthNm)} nm`;
      return `M ${formatNumber(light.magnitude, { decimals: 2 })} ${light.system} (${where})`;
    }
    case 'lineFlux':
      return `${figures(light.fluxErgSCm2)} erg/s/cm² (${formatNumber(light.restWavelengthNm, { significant: 6 })} nm)`;
    case 'lineLuminosity':
      return `${figures(light.luminosityErgS)} erg/s (${formatNumber(light.restWavelengthNm, { significant: 6 })} nm)`;
    case 'starFormationRate':
      return `${figures(light.solarMassesPerYear)} M☉/yr`;
    case 'typical':
      return `typical ${light.of === 'supernovaIa' ? 'type Ia supernova' : 'star-forming galaxy'} (suggestion)`;
  }
}

/** A size in a few words. */
export function describeExtent(extent: Extent): string {
  switch (extent.kind) {
    case 'point':
      return 'point';
    case 'uniform':
      return 'even surface';
    case 'typical':
      return 'typical (suggestion)';
    case 'sersic':
      return `${formatNumber(extent.halfLightRadius, { significant: 3 })}${extent.unit === 'kpc' ? '\u202fkpc' : '″'}`;
  }
}

/** How well a redshift is known, in a few words. */
export function describeUncertainty(uncertainty: RedshiftUncertainty | null): string {
  switch (uncertainty?.kind) {
    case undefined:
      return 'not given';
    case 'gaussian':
      return `± ${figures(uncertainty.sigma)}`;
    case 'percentiles':
      return `${figures(uncertainty.p16)} to ${figures(uncertainty.p84)}, median ${figures(uncertainty.p50)}`;
    case 'table':
      return `p(z) of ${counted(uncertainty.redshifts.length, 'point')}`;
  }
}
