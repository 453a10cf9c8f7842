import { CosmologyParameters } from '@faintward/contracts/cosmology';
import { Extent, Light } from '@faintward/contracts/light';
import { parseNumber } from '../form/parseNumber';
import {
  containedFields,
  contains,
  quantityFields,
  type Contained,
  type LightDraft,
  type LightErrors,
  type LightField,
} from './lightDraft';

/** Which typed field a part of the contract's light is; parts that depend on the kind are in {@link lightFieldOf}. */
const fieldOfLight: Record<string, LightField> = {
  bandId: 'band',
  restBandId: 'restBand',
  fluxErgSCm2: 'flux',
  luminosityErgS: 'luminosity',
  velocityWidthKmS: 'width',
  solarMassesPerYear: 'rate',
  calibration: 'calibration',
  tracer: 'tracer',
  escapeFraction: 'escape',
  of: 'typicalOf',
  sigmaMag: 'sigma',
  continuum: 'continuum',
  'continuum.magnitudeAb': 'continuumMagnitude',
  'continuum.restEquivalentWidthNm': 'continuumWidth',
  derivedWith: 'derivedWith',
  'derivedWith.hubbleConstantKmSMpc': 'derivedH0',
  'derivedWith.omegaMatter': 'derivedOm',
  spectrum: 'spectrum',
  'spectrum.slopeBeta': 'slope',
  'spectrum.escapeFraction': 'lymanEscape',
  'spectrum.breakRatio': 'breakRatio',
  'spectrum.lymanAlphaNm': 'lymanAlpha',
  'spectrum.oxygenIINm': 'oxygenII',
  'spectrum.oxygenIIIHydrogenBetaNm': 'oxygenIII',
  'spectrum.hydrogenAlphaNm': 'hydrogenAlpha',
  'spectrum.template': 'template',
  'spectrum.phaseDays': 'phase',
  'spectrum.temperatureK': 'temperature',
  'spectrum.spectrumId': 'spectrumId',
  hostDust: 'hostDust',
  'hostDust.colourExcessMag': 'hostDust',
  'hostDust.law': 'hostLaw',
  'hostDust.totalToSelective': 'hostRatio',
  galacticDust: 'galacticDust',
  'galacticDust.colourExcessMag': 'galacticDust',
  'galacticDust.scale': 'galacticScale',
  'galacticDust.law': 'galacticLaw',
  magnification: 'magnification',
  sigmaLnMagnification: 'lensSigma',
  intergalactic: 'intergalactic',
  'includes.hostDust': 'withHostDust',
  'includes.galacticDust': 'withGalacticDust',
  'includes.lensing': 'withLensing',
};
const fieldOfExtent: Record<string, LightField> = {
  halfLightRadius: 'radius',
  unit: 'radiusUnit',
  axisRatio: 'axisRatio',
  relation: 'relation',
  stellarMassSolar: 'stellarMass',
};

/** The field that a path of a request, such as `light.magnitude` or `extent.halfLightRadius`, came from. */
export function lightFieldOf(path: string, draft: LightDraft): LightField | undefined {
  const [object, ...rest] = path.split('.');
  const part = rest.join('.');
  if (object === 'extent') {
    if (part === 'sersicIndex') return draft.extent === 'typical' ? 'typicalSersic' : 'sersic';
    return fieldOfExtent[part] ?? 'extent';
  }
  if (object !== 'light') return undefined;
  if (part === 'magnitude') return draft.light === 'absoluteMagnitude' ? 'absolute' : 'magnitude';
  if (part === 'system') return draft.light === 'absoluteMagnitude' ? 'absoluteSystem' : 'system';
  if (part === 'restWavelengthNm') return draft.light === 'absoluteMagnitude' ? 'rest' : 'restLine';
  // A part of a part without a field of its own belongs to what it is part of.
  return fieldOfLight[part] ?? fieldOfLight[rest[0] ?? ''] ?? 'light';
}

export type ReadLight = { ok: true; light: Light | null; extent: Extent } | { ok: false; errors: LightErrors };

/** What a draft says, in the contract's terms, or what is wrong with which field. */
export function readLightDraft(draft: LightDraft): ReadLight {
  const errors: LightErrors = {};
  if (draft.light === 'none' && draft.typed.trim() !== '') errors.typed = unread;
  const light = Light.nullable().safeParse(lightInput(draft));
  const extent = Extent.safeParse(extentInput(draft));
  const collect = (object: 'light' | 'extent', issues: readonly { path: PropertyKey[]; message: string }[] = []) => {
    for (const issue of issues) {
      const path = [object, ...issue.path].join('.');
      if (path === 'light.derivedWith') Object.assign(errors, derivedErrors(draft));
      const field = lightFieldOf(path, draft);
      if (field) errors[field] ??= draft[field].trim() === '' ? 'Needed.' : messageFor(field, draft, issue.message);
    }
  };
  collect('light', light.error?.issues);
  collect('extent', extent.error?.issues);
  if (light.success && extent.success && Object.keys(errors).length === 0) {
    return { ok: true, light: light.data, extent: extent.data };
  }
  return { ok: false, errors };
}

/** Said of a text with a unit until the server has read it. */
const unread = 'Press Enter or leave the field to have it read.';

function messageFor(field: LightField, draft: LightDraft, message: string): string {
  const isQuantity = Object.values(quantityFields).some((name) => name === field);
  return isQuantity && typeof parseNumber(draft[field]) === 'string' ? unread : message;
}

type Input = Record<string, unknown>;

function lightInput(draft: LightDraft): Input | null {
  if (draft.light === 'none') return null;
  return { kind: draft.light, ...valueInput(draft), ...onTheWayInput(draft), sigmaMag: number(draft, 'sigma') };
}

function valueInput(draft: LightDraft): Input {
  const spectrum = spectrumInput(draft);
  const derivedWith = derivedInput(draft);
  switch (draft.light) {
    case 'none':
      return {};
    case 'apparentMagnitude':
      return { magnitude: number(draft, 'magnitude'), system: draft.system, bandId: draft.band, spectrum };
    case 'absoluteMagnitude':
      return {
        magnitude: number(draft, 'absolute'),
        system: draft.absoluteSystem,
        restWavelengthNm: number(draft, 'rest'),
        restBandId: draft.restBand || null,
        derivedWith,
        spectrum,
      };
    case 'lineFlux':
      return { fluxErgSCm2: number(draft, 'flux'), ...lineInput(draft) };
    case 'lineLuminosity':
      return { luminosityErgS: number(draft, 'luminosity'), ...lineInput(draft), derivedWith };
    case 'starFormationRate':
      return {
        solarMassesPerYear: number(draft, 'rate'),
        calibration: draft.calibration,
        tracer: draft.tracer,
        escapeFraction: number(draft, 'escape') ?? null,
        velocityWidthKmS: number(draft, 'width'),
        derivedWith,
        spectrum,
      };
    case 'typical':
      return { of: draft.typicalOf, spectrum };
  }
}

function lineInput(draft: LightDraft): Input {
  const continua = {
    none: null,
    magnitude: { kind: 'magnitude', magnitudeAb: number(draft, 'continuumMagnitude') },
    equivalentWidth: { kind: 'equivalentWidth', restEquivalentWidthNm: number(draft, 'continuumWidth') },
  };
  return {
    restWavelengthNm: number(draft, 'restLine'),
    velocityWidthKmS: number(draft, 'width'),
    continuum: continua[draft.continuum],
  };
}

function spectrumInput(draft: LightDraft): Input {
  const parts: Record<LightDraft['spectrum'], Input> = {
    powerLaw: { slopeBeta: number(draft, 'slope'), escapeFraction: number(draft, 'lymanEscape') },
    starForming: {
      slopeBeta: number(draft, 'slope'),
      breakRatio: number(draft, 'breakRatio'),
      lymanAlphaNm: number(draft, 'lymanAlpha'),
      oxygenIINm: number(draft, 'oxygenII'),
      oxygenIIIHydrogenBetaNm: number(draft, 'oxygenIII'),
      hydrogenAlphaNm: number(draft, 'hydrogenAlpha'),
    },
    passive: {},
    quasar: { template: draft.template },
    supernovaIa: { phaseDays: number(draft, 'phase') },
    blackbody: { temperatureK: number(draft, 'temperature') },
    uploaded: { spectrumId: draft.spectrumId },
  };
  return { kind: draft.spectrum, ...parts[draft.spectrum] };
}

function derivedInput(draft: LightDraft): unknown {
  if (draft.derivedWith === 'inUse') return null;
  if (draft.derivedWith !== 'own') return draft.derivedWith;
  return {
    ...otherParameters(draft),
    hubbleConstantKmSMpc: number(draft, 'derivedH0'),
    omegaMatter: number(draft, 'derivedOm'),
  };
}

/** Parameters of a cosmology beside H₀ and Ω_m, as the draft keeps them. */
export function otherParameters(draft: LightDraft): Input {
  if (draft.derivedMore === '') return {};
  try {
    const more: unknown = JSON.parse(draft.derivedMore);
    return typeof more === 'object' && more !== null ? (more as Input) : {};
  } catch (error) {
    // Only a mistyped link gets here: the model is then the one of the two fields.
    console.warn('Further parameters of the cosmology could not be read.', error);
    return {};
  }
}

/** A choice between presets and parameters only says that neither fits; the fields want to know which is wrong. */
function derivedErrors(draft: LightDraft): LightErrors {
  if (draft.derivedWith !== 'own') return {};
  const errors: LightErrors = {};
  for (const issue of CosmologyParameters.safeParse(derivedInput(draft)).error?.issues ?? []) {
    const field = issue.path[0] === 'hubbleConstantKmSMpc' ? 'derivedH0' : 'derivedOm';
    errors[field] ??= draft[field].trim() === '' ? 'Needed.' : issue.message;
  }
  return errors;
}

function onTheWayInput(draft: LightDraft): Input {
  const includes = Object.fromEntries(
    (Object.keys(containedFields) as Contained[]).map((what) => [what, contains(draft, what)]),
  );
  const isGiven = (field: LightField) => draft[field].trim() !== '';
  return {
    hostDust: isGiven('hostDust')
      ? {
          law: draft.hostLaw,
          colourExcessMag: number(draft, 'hostDust'),
          totalToSelective: number(draft, 'hostRatio') ?? null,
        }
      : null,
    galacticDust: isGiven('galacticDust')
      ? { colourExcessMag: number(draft, 'galacticDust'), scale: draft.galacticScale, law: draft.galacticLaw }
      : null,
    magnification: number(draft, 'magnification'),
    sigmaLnMagnification: number(draft, 'lensSigma'),
    intergalactic: draft.intergalactic,
    includes,
  };
}

function extentInput(draft: LightDraft): Input {
  const parts: Record<LightDraft['extent'], Input> = {
    point: {},
    uniform: {},
    sersic: {
      halfLightRadius: number(draft, 'radius'),
      unit: draft.radiusUnit,
      sersicIndex: number(draft, 'sersic'),
      axisRatio: number(draft, 'axisRatio'),
    },
    typical: {
      relation: draft.relation,
      stellarMassSolar: number(draft, 'stellarMass'),
      sersicIndex: number(draft, 'typicalSersic'),
      axisRatio: number(draft, 'axisRatio'),
    },
  };
  return { kind: draft.extent, ...parts[draft.extent] };
}

/** Empty is undefined, so that the contract's default or "needed" applies; what is no number is refused by the schema. */
function number(draft: LightDraft, field: LightField): number | string | undefined {
  return parseNumber(draft[field]) ?? undefined;
}
