import { Extent, Light } from '@faintward/contracts/light';
import { parseNumber } from '../../ui/form/parseNumber';

/**
 * Light and extent as texts typed and choices made, flat, so that a change of kind loses nothing that was typed before.
 */
export interface LightDraft {
  light: 'none' | Light['kind'];
  magnitude: string;
  system: string;
  band: string;
  absolute: string;
  restContinuum: string;
  flux: string;
  luminosity: string;
  restLine: string;
  width: string;
  slope: string;
  sigma: string;
  extent: Extent['kind'];
  radius: string;
  radiusUnit: string;
  sersic: string;
  axisRatio: string;
}
export type LightField = keyof LightDraft;
export type LightErrors = Partial<Record<LightField, string>>;

const empty: LightDraft = {
  light: 'none',
  magnitude: '',
  system: 'AB',
  band: 'V',
  absolute: '',
  restContinuum: '150',
  flux: '',
  luminosity: '',
  restLine: '121.567',
  width: '200',
  slope: '−2',
  sigma: '',
  extent: 'point',
  radius: '',
  radiusUnit: 'kpc',
  sersic: '1',
  axisRatio: '1',
};

const text = (value: number | undefined) => (value === undefined ? '' : String(value).replace(/^-/, '−'));

export function toLightDraft(light: Light | null, extent: Extent): LightDraft {
  const draft = { ...empty, extent: extent.kind };
  if (extent.kind === 'sersic') {
    draft.radius = text(extent.halfLightRadius);
    draft.radiusUnit = extent.unit;
    draft.sersic = text(extent.sersicIndex);
    draft.axisRatio = text(extent.axisRatio);
  }
  if (light === null) return draft;
  draft.light = light.kind;
  draft.sigma = text(light.sigmaMag);
  switch (light.kind) {
    case 'apparentMagnitude':
      return {
        ...draft,
        magnitude: text(light.magnitude),
        system: light.system,
        band: light.bandId,
        slope: text(light.spectralSlopeBeta),
      };
    case 'absoluteMagnitude':
      return {
        ...draft,
        absolute: text(light.magnitudeAb),
        restContinuum: text(light.restWavelengthNm),
        slope: text(light.spectralSlopeBeta),
      };
    case 'lineFlux':
      return {
        ...draft,
        flux: text(light.fluxErgSCm2),
        restLine: text(light.restWavelengthNm),
        width: text(light.velocityWidthKmS),
      };
    case 'lineLuminosity':
      return {
        ...draft,
        luminosity: text(light.luminosityErgS),
        restLine: text(light.restWavelengthNm),
        width: text(light.velocityWidthKmS),
      };
  }
}

/** Which typed field a part of the contract's object is, without `light.` or `extent.`. */
const fieldOfPart: Record<string, LightField> = {
  magnitude: 'magnitude',
  system: 'system',
  bandId: 'band',
  magnitudeAb: 'absolute',
  fluxErgSCm2: 'flux',
  luminosityErgS: 'luminosity',
  velocityWidthKmS: 'width',
  spectralSlopeBeta: 'slope',
  sigmaMag: 'sigma',
  halfLightRadius: 'radius',
  unit: 'radiusUnit',
  sersicIndex: 'sersic',
  axisRatio: 'axisRatio',
};

/** The field that a path of the request, such as `light.magnitude`, came from. */
export function fieldOfPath(path: string, draft: LightDraft): LightField | undefined {
  const [object, part] = path.split('.');
  if (object !== 'light' && object !== 'extent') return undefined;
  if (part === undefined || part === 'kind') return object;
  if (part === 'restWavelengthNm') return draft.light === 'absoluteMagnitude' ? 'restContinuum' : 'restLine';
  return fieldOfPart[part] ?? object;
}

export type ReadLight = { ok: true; light: Light | null; extent: Extent } | { ok: false; errors: LightErrors };

/** What a draft says, in the contract's terms, or what is wrong with which field. */
export function readLightDraft(draft: LightDraft): ReadLight {
  const number = (field: LightField) => parseNumber(draft[field]) ?? undefined;
  const line = { restWavelengthNm: number('restLine'), velocityWidthKmS: number('width'), sigmaMag: number('sigma') };
  const lights = {
    none: null,
    apparentMagnitude: {
      magnitude: number('magnitude'),
      system: draft.system,
      bandId: draft.band,
      spectralSlopeBeta: number('slope'),
      sigmaMag: number('sigma'),
    },
    absoluteMagnitude: {
      magnitudeAb: number('absolute'),
      restWavelengthNm: number('restContinuum'),
      spectralSlopeBeta: number('slope'),
      sigmaMag: number('sigma'),
    },
    lineFlux: { fluxErgSCm2: number('flux'), ...line },
    lineLuminosity: { luminosityErgS: number('luminosity'), ...line },
  };
  const extents = {
    point: {},
    uniform: {},
    sersic: {
      halfLightRadius: number('radius'),
      unit: draft.radiusUnit,
      sersicIndex: number('sersic'),
      axisRatio: number('axisRatio'),
    },
  };
  const chosen = lights[draft.light];
  const light = Light.nullable().safeParse(chosen && { kind: draft.light, ...chosen });
  const extent = Extent.safeParse({ kind: draft.extent, ...extents[draft.extent] });
  if (light.success && extent.success) return { ok: true, light: light.data, extent: extent.data };
  const errors: LightErrors = {};
  const collect = (object: 'light' | 'extent', issues: readonly { path: PropertyKey[]; message: string }[] = []) => {
    for (const issue of issues) {
      const field = fieldOfPath([object, ...issue.path].join('.'), draft);
      if (field) errors[field] ??= draft[field].trim() === '' ? 'Needed.' : issue.message;
    }
  };
  collect('light', light.error?.issues);
  collect('extent', extent.error?.issues);
  return { ok: false, errors };
}
