import { CosmologyPresetId } from '@faintward/contracts/cosmology';
import {
  BandId,
  DustLaw,
  Extent,
  IntergalacticModel,
  Light,
  MagnitudeSystem,
  SizeRelation,
  Spectrum,
} from '@faintward/contracts/light';
import { z } from 'zod';

const text = (fallback = '') => z.string().max(500).catch(fallback);
const yesNo = z.enum(['', 'yes', 'no']).catch('');

/**
 * Light and size as texts typed and choices made, flat, so that a change of kind loses nothing that was typed before, and
 * so that a link can hold it. Every field falls back, so that an old or mistyped link still opens.
 */
export const LightDraft = z.object({
  light: z
    .enum([
      'none',
      'apparentMagnitude',
      'absoluteMagnitude',
      'lineFlux',
      'lineLuminosity',
      'starFormationRate',
      'typical',
    ])
    .catch('none'),
  /** What is typed while no kind is chosen: the server says what it is. */
  typed: text(),
  magnitude: text(),
  system: MagnitudeSystem.catch('AB'),
  band: BandId.catch('V'),
  absolute: text(),
  absoluteSystem: MagnitudeSystem.catch('AB'),
  rest: text('150'),
  restBand: z.enum(['', ...BandId.options]).catch(''),
  flux: text(),
  luminosity: text(),
  restLine: text('121.567'),
  width: text('200'),
  continuum: z.enum(['none', 'magnitude', 'equivalentWidth']).catch('none'),
  continuumMagnitude: text(),
  continuumWidth: text(),
  rate: text(),
  calibration: z.enum(['kennicutt1998', 'kennicuttEvans2012', 'madauDickinson2014']).catch('kennicuttEvans2012'),
  tracer: z.enum(['ultraviolet', 'hydrogenAlpha', 'lymanAlpha']).catch('ultraviolet'),
  escape: text(),
  typicalOf: z.enum(['starFormingGalaxy', 'supernovaIa']).catch('starFormingGalaxy'),
  sigma: text(),
  derivedWith: z.enum(['inUse', ...CosmologyPresetId.options, 'own']).catch('inUse'),
  derivedH0: text('70'),
  derivedOm: text('0.3'),
  /** Other parameters of such a cosmology, as JSON: kept, though the form has no fields for them. */
  derivedMore: text(),

  spectrum: z
    .enum(['powerLaw', 'starForming', 'passive', 'quasar', 'supernovaIa', 'blackbody', 'uploaded'])
    .catch('powerLaw'),
  slope: text('−2'),
  lymanEscape: text('0'),
  breakRatio: text('1.2'),
  lymanAlpha: text('0'),
  oxygenII: text('0'),
  oxygenIII: text('0'),
  hydrogenAlpha: text('0'),
  template: z.enum(['powerLaws', 'hewettWild2010']).catch('powerLaws'),
  phase: text('0'),
  temperature: text(),
  spectrumId: text(),

  hostDust: text(),
  hostLaw: DustLaw.catch('calzetti2000'),
  hostRatio: text(),
  galacticDust: text(),
  galacticScale: z.enum(['sfd', 'true']).catch('sfd'),
  galacticLaw: z.enum(['fitzpatrick1999', 'ccm1989']).catch('fitzpatrick1999'),
  magnification: text(),
  lensSigma: text(),
  intergalactic: IntergalacticModel.catch('inoue2014'),
  /** What the value contains; empty is what values of its kind usually do. */
  withHostDust: yesNo,
  withGalacticDust: yesNo,
  withLensing: yesNo,

  extent: z.enum(['point', 'sersic', 'typical', 'uniform']).catch('point'),
  radius: text(),
  radiusUnit: z.enum(['kpc', 'arcsec']).catch('kpc'),
  sersic: text('1'),
  typicalSersic: text('1.5'),
  axisRatio: text('1'),
  relation: SizeRelation.catch('shibuya2015'),
  stellarMass: text('5e10'),
});
export type LightDraft = z.output<typeof LightDraft>;
export type LightField = keyof LightDraft;
export type LightErrors = Partial<Record<LightField, string>>;

export const emptyLightDraft: LightDraft = LightDraft.parse({});

/** The field of the one quantity that says how bright it is. */
export const quantityFields = {
  none: 'typed',
  apparentMagnitude: 'magnitude',
  absoluteMagnitude: 'absolute',
  lineFlux: 'flux',
  lineLuminosity: 'luminosity',
  starFormationRate: 'rate',
} as const satisfies Record<Exclude<LightDraft['light'], 'typical'>, LightField>;

export type Contained = 'hostDust' | 'galacticDust' | 'lensing';
export const containedFields = {
  hostDust: 'withHostDust',
  galacticDust: 'withGalacticDust',
  lensing: 'withLensing',
} as const satisfies Record<Contained, LightField>;

const onlyHost = { hostDust: true, galacticDust: false, lensing: false };
const everything = { hostDust: true, galacticDust: true, lensing: true };
const nothing = { hostDust: false, galacticDust: false, lensing: false };
/** What a value of each kind contains unless somebody says otherwise; the contract has the same defaults. */
export const usuallyContained: Record<Light['kind'], Record<Contained, boolean>> = {
  apparentMagnitude: everything,
  lineFlux: everything,
  absoluteMagnitude: onlyHost,
  lineLuminosity: onlyHost,
  typical: onlyHost,
  starFormationRate: nothing,
};

/** Whether the draft's value contains it. */
export function contains(draft: LightDraft, what: Contained): boolean {
  if (draft.light === 'none') return false;
  const said = draft[containedFields[what]];
  return said === '' ? usuallyContained[draft.light][what] : said === 'yes';
}

/** A number as it is typed, with every digit and a true minus. */
export function numberText(value: number | null | undefined): string {
  return value == null ? '' : String(value).replace(/^-/, '−');
}

export function toLightDraft(light: Light | null, extent: Extent, base: LightDraft = emptyLightDraft): LightDraft {
  return { ...base, ...(light ? lightPart(light) : { light: 'none' as const }), ...extentPart(extent) };
}

/** What of a draft a light decides. */
export function lightPart(light: Light): Partial<LightDraft> {
  return {
    light: light.kind,
    typed: '',
    sigma: numberText(light.sigmaMag),
    ...onTheWayPart(light),
    ...valuePart(light),
    ...('spectrum' in light ? spectrumPart(light.spectrum) : {}),
    ...('derivedWith' in light ? derivedPart(light.derivedWith) : {}),
  };
}

function valuePart(light: Light): Partial<LightDraft> {
  switch (light.kind) {
    case 'apparentMagnitude':
      return { magnitude: numberText(light.magnitude), system: light.system, band: light.bandId };
    case 'absoluteMagnitude':
      return {
        absolute: numberText(light.magnitude),
        absoluteSystem: light.system,
        rest: numberText(light.restWavelengthNm),
        restBand: light.restBandId ?? '',
      };
    case 'lineFlux':
      return { flux: numberText(light.fluxErgSCm2), ...linePart(light) };
    case 'lineLuminosity':
      return { luminosity: numberText(light.luminosityErgS), ...linePart(light) };
    case 'starFormationRate':
      return {
        rate: numberText(light.solarMassesPerYear),
        calibration: light.calibration,
        tracer: light.tracer,
        escape: numberText(light.escapeFraction),
        width: numberText(light.velocityWidthKmS),
      };
    case 'typical':
      return { typicalOf: light.of };
  }
}

function linePart({
  restWavelengthNm,
  velocityWidthKmS,
  continuum,
}: Extract<Light, { kind: 'lineFlux' | 'lineLuminosity' }>): Partial<LightDraft> {
  return {
    restLine: numberText(restWavelengthNm),
    width: numberText(velocityWidthKmS),
    continuum: continuum?.kind ?? 'none',
    ...(continuum?.kind === 'magnitude' ? { continuumMagnitude: numberText(continuum.magnitudeAb) } : {}),
    ...(continuum?.kind === 'equivalentWidth' ? { continuumWidth: numberText(continuum.restEquivalentWidthNm) } : {}),
  };
}

function spectrumPart(spectrum: Spectrum): Partial<LightDraft> {
  const { kind } = spectrum;
  switch (kind) {
    case 'powerLaw':
      return {
        spectrum: kind,
        slope: numberText(spectrum.slopeBeta),
        lymanEscape: numberText(spectrum.escapeFraction),
      };
    case 'starForming':
      return {
        spectrum: kind,
        slope: numberText(spectrum.slopeBeta),
        breakRatio: numberText(spectrum.breakRatio),
        lymanAlpha: numberText(spectrum.lymanAlphaNm),
        oxygenII: numberText(spectrum.oxygenIINm),
        oxygenIII: numberText(spectrum.oxygenIIIHydrogenBetaNm),
        hydrogenAlpha: numberText(spectrum.hydrogenAlphaNm),
      };
    case 'passive':
      return { spectrum: kind };
    case 'quasar':
      return { spectrum: kind, template: spectrum.template };
    case 'supernovaIa':
      return { spectrum: kind, phase: numberText(spectrum.phaseDays) };
    case 'blackbody':
      return { spectrum: kind, temperature: numberText(spectrum.temperatureK) };
    case 'uploaded':
      return { spectrum: kind, spectrumId: spectrum.spectrumId };
  }
}

function derivedPart(cosmology: Extract<Light, { derivedWith: unknown }>['derivedWith']): Partial<LightDraft> {
  if (cosmology === null) return { derivedWith: 'inUse' };
  if (typeof cosmology === 'string') return { derivedWith: cosmology };
  const { hubbleConstantKmSMpc, omegaMatter, ...more } = cosmology;
  return {
    derivedWith: 'own',
    derivedH0: numberText(hubbleConstantKmSMpc),
    derivedOm: numberText(omegaMatter),
    derivedMore: Object.keys(more).length > 0 ? JSON.stringify(more) : '',
  };
}

function onTheWayPart(light: Light): Partial<LightDraft> {
  const { hostDust, galacticDust, includes } = light;
  const usual = usuallyContained[light.kind];
  const said = (what: Contained) => (includes[what] === usual[what] ? '' : includes[what] ? 'yes' : 'no');
  return {
    hostDust: numberText(hostDust?.colourExcessMag),
    ...(hostDust ? { hostLaw: hostDust.law, hostRatio: numberText(hostDust.totalToSelective) } : {}),
    galacticDust: numberText(galacticDust?.colourExcessMag),
    ...(galacticDust ? { galacticScale: galacticDust.scale, galacticLaw: galacticDust.law } : {}),
    magnification: light.magnification === 1 ? '' : numberText(light.magnification),
    lensSigma: numberText(light.sigmaLnMagnification),
    intergalactic: light.intergalactic,
    withHostDust: said('hostDust'),
    withGalacticDust: said('galacticDust'),
    withLensing: said('lensing'),
  };
}

/** What of a draft an extent decides. */
export function extentPart(extent: Extent): Partial<LightDraft> {
  switch (extent.kind) {
    case 'point':
    case 'uniform':
      return { extent: extent.kind };
    case 'sersic':
      return {
        extent: extent.kind,
        radius: numberText(extent.halfLightRadius),
        radiusUnit: extent.unit,
        sersic: numberText(extent.sersicIndex),
        axisRatio: numberText(extent.axisRatio),
      };
    case 'typical':
      return {
        extent: extent.kind,
        relation: extent.relation,
        stellarMass: numberText(extent.stellarMassSolar),
        typicalSersic: numberText(extent.sersicIndex),
        axisRatio: numberText(extent.axisRatio),
      };
  }
}
