import { BandId } from '@faintward/contracts/light';
import type { RedshiftUncertainty } from '@faintward/contracts/light';
import { LightReportRequest } from '@faintward/contracts/light-report';
import { z } from 'zod';
import { parseNumber } from '../../ui/form/parseNumber';
import { LightDraft } from '../../ui/light/lightDraft';
import { lightFieldOf, readLightDraft } from '../../ui/light/readLightDraft';
import { readRedshiftDraft, redshiftFieldOf, type RedshiftDraft } from '../../ui/light/redshiftDraft';

const text = (fallback = '') => z.string().max(500).catch(fallback);

/**
 * A source as typed: its light and size, its redshift, and what is asked of it. Flat and of texts, so that a link holds it;
 * every field falls back, so that an old or mistyped link still opens. It begins with an example that answers at once.
 */
export const SourceState = z.object({
  ...LightDraft.shape,
  light: LightDraft.shape.light.unwrap().catch('absoluteMagnitude'),
  magnitude: text('24.5'),
  band: LightDraft.shape.band.unwrap().catch('r'),
  absolute: text('−21'),
  flux: text('2e-17'),
  luminosity: text('1e43'),
  rate: text('20'),
  radius: text('0.6'),
  redshift: text('7'),
  redshiftKind: z.enum(['spectroscopic', 'photometric', 'assumed']).catch('spectroscopic'),
  uncertainty: z.enum(['none', 'gaussian', 'percentiles', 'table']).catch('none'),
  sigmaZ: text(),
  p16: text(),
  p50: text(),
  p84: text(),
  cosmology: z.enum(['planck18', 'planck15', 'wmap9', 'conv70', 'ladder73']).catch('planck18'),
  /** Band of the light budget; empty leaves it to the server. */
  ledgerBand: z.enum(['', ...BandId.options]).catch(''),
  seeing: text('0.8'),
  aperture: text(),
});
export type SourceState = z.output<typeof SourceState>;
export type SourceField = keyof SourceState;
export type SourceErrors = Partial<Record<SourceField | 'table', string>>;

/** A table p(z), too long for a link: kept beside the state. */
export type DistributionTable = RedshiftDraft['table'];

const defaults = SourceState.parse({});

export function readSource(address: URLSearchParams): SourceState {
  return SourceState.parse(Object.fromEntries(address));
}

export function writeSource(state: SourceState): URLSearchParams {
  const address = new URLSearchParams();
  for (const [name, value] of Object.entries(state)) {
    if (value !== defaults[name as SourceField]) address.set(name, value);
  }
  return address;
}

const fieldOfPath: Record<string, SourceField> = {
  cosmology: 'cosmology',
  bandId: 'ledgerBand',
  seeingArcsec: 'seeing',
  apertureRadiusArcsec: 'aperture',
};

/** Which typed field a path of the request came from. */
export function sourceFieldOf(
  path: string,
  state: SourceState,
  table: DistributionTable,
): keyof SourceErrors | undefined {
  return fieldOfPath[path] ?? redshiftFieldOf(path, { ...state, table }) ?? lightFieldOf(path, state);
}

/** The request that a source asks, or what is wrong with which field. */
export function toLightRequest(
  state: SourceState,
  table: DistributionTable,
): { request: LightReportRequest; errors: SourceErrors } | { request: undefined; errors: SourceErrors } {
  const redshift = readRedshiftDraft({ ...state, table });
  const source = readLightDraft(state);
  if (!redshift.ok || !source.ok) {
    return {
      request: undefined,
      errors: { ...(redshift.ok ? {} : redshift.errors), ...(source.ok ? {} : source.errors) },
    };
  }
  const uncertainty: RedshiftUncertainty | null = redshift.uncertainty;
  const seeing = parseNumber(state.seeing);
  const aperture = parseNumber(state.aperture);
  const parsed = LightReportRequest.safeParse({
    cosmology: state.cosmology,
    redshift: redshift.redshift,
    redshiftUncertainty: uncertainty,
    light: source.light,
    extent: source.extent,
    bandId: state.ledgerBand === '' ? null : state.ledgerBand,
    seeingArcsec: seeing ?? undefined,
    apertureRadiusArcsec: aperture,
  });
  if (parsed.success) return { request: parsed.data, errors: {} };
  const errors: SourceErrors = {};
  for (const issue of parsed.error.issues) {
    const field = sourceFieldOf(issue.path.join('.'), state, table);
    if (field) errors[field] ??= issue.message;
  }
  return { request: undefined, errors };
}
