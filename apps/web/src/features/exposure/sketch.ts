import { EstimateRequest } from '@faintward/contracts/estimates';
import type { Telescope } from '@faintward/contracts/facilities';
import { z } from 'zod';
import { parseNumber } from '../../ui/form/parseNumber';

/**
 * What the sketchpad holds: texts as typed and choices made, flat, so that a change of kind loses nothing that was typed
 * before. Every field falls back, so that an old or mistyped link still opens a sketch.
 */
export const Sketch = z.object({
  redshift: z.string().catch('7.12'),
  cosmology: z.enum(['planck18', 'planck15', 'wmap9', 'conv70', 'ladder73']).catch('planck18'),
  light: z.enum(['apparentMagnitude', 'absoluteMagnitude', 'lineFlux', 'lineLuminosity']).catch('absoluteMagnitude'),
  magnitude: z.string().catch('24.5'),
  system: z.enum(['AB', 'Vega']).catch('AB'),
  band: z.string().catch('r'),
  absolute: z.string().catch('−21'),
  flux: z.string().catch('2e-17'),
  luminosity: z.string().catch('1e43'),
  rest: z.string().catch('150'),
  restLine: z.string().catch('121.567'),
  slope: z.string().catch('−2'),
  width: z.string().catch('200'),
  magnification: z.string().catch(''),
  extent: z.enum(['point', 'sersic', 'uniform']).catch('point'),
  radius: z.string().catch('0.8'),
  radiusUnit: z.enum(['kpc', 'arcsec']).catch('kpc'),
  sersic: z.string().catch('1'),
  mode: z.string().catch(''),
  goal: z.enum(['signalToNoise', 'lineSignificance', 'exposureTime']).catch('signalToNoise'),
  snr: z.string().catch('5'),
  per: z.enum(['aperture', 'arcsec2', 'pixel', 'resolutionElement']).catch('aperture'),
  single: z.string().catch(''),
  count: z.string().catch('6'),
  seeing: z.string().catch('0.85'),
  airmass: z.string().catch('1.2'),
  moon: z.enum(['dark', 'grey', 'bright']).catch('dark'),
  transparency: z.enum(['clear', 'thinCloud']).catch('clear'),
});
export type Sketch = z.output<typeof Sketch>;
export type SketchField = keyof Sketch;

export function readSketch(address: URLSearchParams): Sketch {
  return Sketch.parse(Object.fromEntries(address));
}

const defaults = Sketch.parse({});

export function writeSketch(sketch: Sketch): URLSearchParams {
  const address = new URLSearchParams();
  for (const [name, value] of Object.entries(sketch)) {
    if (value !== defaults[name as SketchField]) address.set(name, value);
  }
  return address;
}

/** Every mode that may be asked for, with its instrument and telescope. */
export function offeredModes(telescopes: readonly Telescope[]) {
  return telescopes.flatMap((telescope) =>
    telescope.instruments
      .filter((instrument) => instrument.isOffered)
      .flatMap((instrument) =>
        instrument.modes
          .filter((mode) => mode.isOffered)
          .map((mode) => ({ telescope, instrument, mode, id: mode.modeId })),
      ),
  );
}

/** Which typed field a path of the request came from. */
const fieldOfPath: Record<string, SketchField> = {
  'target.redshift': 'redshift',
  'target.light.magnitude': 'magnitude',
  'target.light.system': 'system',
  'target.light.bandId': 'band',
  'target.light.magnitudeAb': 'absolute',
  'target.light.fluxErgSCm2': 'flux',
  'target.light.luminosityErgS': 'luminosity',
  'target.light.spectralSlopeBeta': 'slope',
  'target.light.velocityWidthKmS': 'width',
  'target.magnification': 'magnification',
  'target.extent': 'radius',
  'target.extent.halfLightRadius': 'radius',
  'target.extent.sersicIndex': 'sersic',
  setup: 'mode',
  'setup.modeId': 'mode',
  'goal.value': 'snr',
  'goal.sigma': 'snr',
  'goal.per': 'per',
  'goal.exposureSeconds': 'single',
  'goal.exposureCount': 'count',
  'conditions.seeingArcsec': 'seeing',
  'conditions.airmass': 'airmass',
  'conditions.moonClass': 'moon',
};

export function fieldOf(path: string, sketch: Sketch): SketchField | undefined {
  if (path === 'target.light.restWavelengthNm') return sketch.light === 'absoluteMagnitude' ? 'rest' : 'restLine';
  return fieldOfPath[path];
}

/** The request that a sketch asks, or what is wrong with which field. */
export function toRequest(
  sketch: Sketch,
):
  | { request: EstimateRequest; errors: Partial<Record<SketchField, string>> }
  | { request: undefined; errors: Partial<Record<SketchField, string>> } {
  const number = (field: SketchField) => parseNumber(sketch[field]) ?? undefined;
  const light = {
    apparentMagnitude: {
      kind: 'apparentMagnitude',
      magnitude: number('magnitude'),
      system: sketch.system,
      bandId: sketch.band,
      spectralSlopeBeta: number('slope'),
    },
    absoluteMagnitude: {
      kind: 'absoluteMagnitude',
      magnitudeAb: number('absolute'),
      restWavelengthNm: number('rest'),
      spectralSlopeBeta: number('slope'),
    },
    lineFlux: {
      kind: 'lineFlux',
      fluxErgSCm2: number('flux'),
      restWavelengthNm: number('restLine'),
      velocityWidthKmS: number('width'),
    },
    lineLuminosity: {
      kind: 'lineLuminosity',
      luminosityErgS: number('luminosity'),
      restWavelengthNm: number('restLine'),
      velocityWidthKmS: number('width'),
    },
  }[sketch.light];
  const extent = {
    point: { kind: 'point' },
    uniform: { kind: 'uniform' },
    sersic: {
      kind: 'sersic',
      halfLightRadius: number('radius'),
      unit: sketch.radiusUnit,
      sersicIndex: number('sersic'),
    },
  }[sketch.extent];
  const goal = {
    signalToNoise: { kind: 'signalToNoise', value: number('snr'), per: sketch.per, exposureSeconds: number('single') },
    lineSignificance: { kind: 'lineSignificance', sigma: number('snr'), exposureSeconds: number('single') },
    exposureTime: {
      kind: 'exposureTime',
      exposureSeconds: number('single'),
      exposureCount: number('count'),
      per: sketch.per,
    },
  }[sketch.goal];
  const parsed = EstimateRequest.safeParse({
    cosmology: sketch.cosmology,
    target: { redshift: number('redshift'), light, extent, magnification: number('magnification') },
    setup: { modeId: sketch.mode },
    goal,
    conditions: {
      seeingArcsec: number('seeing'),
      airmass: number('airmass'),
      moonClass: sketch.moon,
      transparency: sketch.transparency,
    },
  });
  if (parsed.success) return { request: parsed.data, errors: {} };
  const errors: Partial<Record<SketchField, string>> = {};
  for (const issue of parsed.error.issues) {
    const field = fieldOf(issue.path.join('.'), sketch);
    if (!field) continue;
    errors[field] ??=
      sketch[field] === '' ? (field === 'mode' ? 'Choose an instrument mode.' : 'Needed.') : issue.message;
  }
  return { request: undefined, errors };
}
