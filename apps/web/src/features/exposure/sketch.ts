import { EstimateRequest } from '@faintward/contracts/estimates';
import { z } from 'zod';
import { fromGoalDraft, goalFieldOfPath } from '../../ui/estimate/goalDraft';
import { parseNumber } from '../../ui/form/parseNumber';
import { LightDraft } from '../../ui/light/lightDraft';
import { lightFieldOf, readLightDraft } from '../../ui/light/readLightDraft';

/** The part of a sketch that describes the source's light and size: a draft that already holds an example of each kind. */
const light = {
  ...LightDraft.shape,
  light: LightDraft.shape.light.transform((kind) => (kind === 'none' ? 'absoluteMagnitude' : kind)),
  magnitude: z.string().max(500).catch('24.5'),
  band: LightDraft.shape.band.catch('r'),
  absolute: z.string().max(500).catch('−21'),
  flux: z.string().max(500).catch('2e-17'),
  luminosity: z.string().max(500).catch('1e43'),
  rate: z.string().max(500).catch('20'),
  radius: z.string().max(500).catch('0.8'),
};

/**
 * What the sketchpad holds: texts as typed and choices made, flat, so that a change of kind loses nothing that was typed
 * before. Every field falls back, so that an old or mistyped link still opens a sketch.
 */
export const Sketch = z.object({
  ...light,
  redshift: z.string().catch('7.12'),
  cosmology: z.enum(['planck18', 'planck15', 'wmap9', 'conv70', 'ladder73']).catch('planck18'),
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
export type SketchErrors = Partial<Record<SketchField, string>>;

const defaults = Sketch.parse({});

/** Marks addresses in which an apparent value contains its magnification unless they say otherwise. */
const addressVersion = '2';

export function readSketch(address: URLSearchParams): Sketch {
  const texts = Object.fromEntries(address);
  // Links without the mark were made when a magnification always came on top of the value.
  const isOlder = texts['v'] === undefined && texts['magnification'] !== undefined;
  return Sketch.parse(isOlder ? { withLensing: 'no', ...texts } : texts);
}

/** Names in the address whose content this sketchpad does not know: of another version, or mistyped. */
export function unknownInAddress(address: URLSearchParams): string[] {
  const sketch: Record<string, unknown> = { ...readSketch(address), v: addressVersion };
  return [...address].filter(([name, value]) => sketch[name] !== value).map(([name]) => name);
}

export function writeSketch(sketch: Sketch): URLSearchParams {
  const address = new URLSearchParams();
  for (const [name, value] of Object.entries(sketch)) {
    if (value !== defaults[name as SketchField]) address.set(name, value);
  }
  if (address.size > 0) address.set('v', addressVersion);
  return address;
}

/** Which typed field a path of the request came from, beside the source's light and size. */
const fieldOfPath: Record<string, SketchField> = {
  ...goalFieldOfPath,
  cosmology: 'cosmology',
  'target.redshift': 'redshift',
  setup: 'mode',
  'setup.modeId': 'mode',
};

export function fieldOf(path: string, sketch: Sketch): SketchField | undefined {
  return fieldOfPath[path] ?? lightFieldOf(path.replace(/^target\./, ''), sketch);
}

/** The request that a sketch asks, or what is wrong with which field. */
export function toRequest(sketch: Sketch): { request: EstimateRequest | undefined; errors: SketchErrors } {
  const source = readLightDraft(sketch);
  const parsed = EstimateRequest.safeParse({
    cosmology: sketch.cosmology,
    target: {
      redshift: parseNumber(sketch.redshift) ?? undefined,
      ...(source.ok ? { light: source.light, extent: source.extent } : placeholder),
    },
    setup: { modeId: sketch.mode },
    ...fromGoalDraft(sketch),
  });
  const errors: SketchErrors = source.ok ? {} : { ...source.errors };
  for (const issue of parsed.error?.issues ?? []) {
    const field = fieldOf(issue.path.join('.'), sketch);
    if (!field) continue;
    errors[field] ??=
      sketch[field] === '' ? (field === 'mode' ? 'Choose an instrument mode.' : 'Needed.') : issue.message;
  }
  return { request: parsed.success && source.ok ? parsed.data : undefined, errors };
}

/** Stands for a light that cannot be read yet, so that the rest of the sketch is checked all the same. */
const placeholder = {
  light: { kind: 'apparentMagnitude', magnitude: 20, bandId: 'V' },
  extent: { kind: 'point' },
} as const;
