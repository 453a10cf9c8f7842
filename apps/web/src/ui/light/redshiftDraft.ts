import { RedshiftKind, RedshiftUncertainty } from '@faintward/contracts/light';
import { z } from 'zod';
import { parseNumber } from '../form/parseNumber';
import { numberText } from './lightDraft';

type Table = Extract<RedshiftUncertainty, { kind: 'table' }>;

/** A redshift, where it comes from and how well it is known, as typed. */
export interface RedshiftDraft {
  redshift: string;
  redshiftKind: RedshiftKind;
  uncertainty: 'none' | RedshiftUncertainty['kind'];
  sigmaZ: string;
  p16: string;
  p50: string;
  p84: string;
  /** A distribution that the server has read; null until then. */
  table: Table | null;
}
export type RedshiftField = keyof RedshiftDraft;
export type RedshiftErrors = Partial<Record<RedshiftField, string>>;

export const emptyRedshiftDraft: RedshiftDraft = {
  redshift: '',
  redshiftKind: 'spectroscopic',
  uncertainty: 'none',
  sigmaZ: '',
  p16: '',
  p50: '',
  p84: '',
  table: null,
};

export function toRedshiftDraft(
  redshift: number,
  redshiftKind: RedshiftKind,
  uncertainty: RedshiftUncertainty | null,
): RedshiftDraft {
  return { ...emptyRedshiftDraft, redshift: numberText(redshift), redshiftKind, ...uncertaintyPart(uncertainty) };
}

/** What of a draft an uncertainty decides. */
export function uncertaintyPart(uncertainty: RedshiftUncertainty | null): Partial<RedshiftDraft> {
  switch (uncertainty?.kind) {
    case undefined:
      return { uncertainty: 'none' };
    case 'gaussian':
      return { uncertainty: 'gaussian', sigmaZ: numberText(uncertainty.sigma) };
    case 'percentiles':
      return {
        uncertainty: 'percentiles',
        p16: numberText(uncertainty.p16),
        p50: numberText(uncertainty.p50),
        p84: numberText(uncertainty.p84),
      };
    case 'table':
      return { uncertainty: 'table', table: uncertainty };
  }
}

const fieldOfPart: Record<string, RedshiftField> = { sigma: 'sigmaZ', p16: 'p16', p50: 'p50', p84: 'p84' };

/** The field that a path of a request, such as `redshiftUncertainty.sigma`, came from. */
export function redshiftFieldOf(path: string, draft: RedshiftDraft): RedshiftField | undefined {
  if (path === 'redshift' || path === 'redshiftKind') return path;
  const [object, part] = path.split('.');
  if (object !== 'redshiftUncertainty') return undefined;
  return fieldOfPart[part ?? ''] ?? (draft.uncertainty === 'table' ? 'table' : 'uncertainty');
}

/** As for a source: 0 to 30. */
const Redshift = z
  .number({ error: 'A redshift is a number.' })
  .min(0, { error: 'A redshift below 0 (a blueshift) has no distance. Give 0 or more.' })
  .max(30, { error: 'Redshifts up to 30 are accepted for sources.' });

export type ReadUncertainty =
  { ok: true; uncertainty: RedshiftUncertainty | null } | { ok: false; errors: RedshiftErrors };

/** How well the redshift is known, by what the draft says. */
export function readUncertaintyDraft(draft: RedshiftDraft): ReadUncertainty {
  if (draft.uncertainty === 'none') return { ok: true, uncertainty: null };
  if (draft.uncertainty === 'table' && draft.table === null) {
    return { ok: false, errors: { table: 'Paste or choose a table.' } };
  }
  const number = (field: 'sigmaZ' | 'p16' | 'p50' | 'p84') => parseNumber(draft[field]) ?? undefined;
  const parts = {
    gaussian: { sigma: number('sigmaZ') },
    percentiles: { p16: number('p16'), p50: number('p50'), p84: number('p84') },
    table: { ...draft.table },
  };
  const parsed = RedshiftUncertainty.safeParse({ kind: draft.uncertainty, ...parts[draft.uncertainty] });
  if (parsed.success) return { ok: true, uncertainty: parsed.data };
  const errors: RedshiftErrors = {};
  for (const issue of parsed.error.issues) {
    const field = redshiftFieldOf(['redshiftUncertainty', ...issue.path].join('.'), draft);
    if (field) errors[field] ??= draft[field] === '' ? 'Needed.' : issue.message;
  }
  return { ok: false, errors };
}

export type ReadRedshift =
  | { ok: true; redshift: number; redshiftKind: RedshiftKind; uncertainty: RedshiftUncertainty | null }
  | { ok: false; errors: RedshiftErrors };

/** What a draft says, in the contract's terms, or what is wrong with which field. */
export function readRedshiftDraft(draft: RedshiftDraft): ReadRedshift {
  const redshift = Redshift.safeParse(parseNumber(draft.redshift) ?? undefined);
  const read = readUncertaintyDraft(draft);
  if (redshift.success && read.ok) {
    return { ok: true, redshift: redshift.data, redshiftKind: draft.redshiftKind, uncertainty: read.uncertainty };
  }
  const own = redshift.success
    ? {}
    : { redshift: draft.redshift.trim() === '' ? 'Needed.' : (redshift.error.issues[0]?.message ?? 'Not a redshift.') };
  return { ok: false, errors: { ...own, ...(read.ok ? {} : read.errors) } };
}
