import { RedshiftUncertainty } from '@faintward/contracts/light';
import { HIGHEST_REDSHIFT, redshiftDistribution } from '@faintward/photometry';
import { normaliseMinus } from '@faintward/tables';
import { addDecimals, subtractDecimals } from './exact-decimals.js';

export interface UncertaintyDefaults {
  /** The redshift that a pair of distances is measured from; undefined while its own cell cannot be read. */
  redshift: number | undefined;
  /** What the text replaces, and the redshift it is shown with. */
  present: { redshift: number; uncertainty: RedshiftUncertainty | null } | undefined;
}

export type UncertaintyParsing =
  | { ok: true; uncertainty: RedshiftUncertainty | null; warning?: string }
  /** Undefined where the redshift that it is measured from cannot be read. */
  | { ok: true; uncertainty: undefined }
  | { ok: false; message: string };

const NUMBER = String.raw`(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?`;
const SYMMETRIC = new RegExp(String.raw`^(?:±|\+\/-|\+-)?\s*(${NUMBER})$`, 'iu');
const UP_DOWN = new RegExp(String.raw`^(?:(${NUMBER})\s*)?\+\s*(${NUMBER})\s*[,;/]?\s*-\s*(${NUMBER})$`, 'i');
const DOWN_UP = new RegExp(String.raw`^(?:(${NUMBER})\s*)?-\s*(${NUMBER})\s*[,;/]?\s*\+\s*(${NUMBER})$`, 'i');
const DISTRIBUTION = /^p\(z\)/i;
const EXAMPLES = '0.02, or +0.05 -0.03 for the 16th and 84th percentile';

/**
 * Reads the uncertainty of a redshift as typed into a cell: `0.02` or `±0.02` is a standard deviation, `+0.05 -0.03` are the
 * distances to the 84th and 16th percentile, with their median in front where it is not the redshift itself. Empty is none. Every
 * text that {@link formatRedshiftUncertainty} writes comes back as it was.
 */
export function parseRedshiftUncertainty(
  typed: string,
  { redshift, present }: UncertaintyDefaults,
): UncertaintyParsing {
  const text = typed.trim();
  if (present !== undefined && text === formatRedshiftUncertainty(present.uncertainty, present.redshift)) {
    // Around its redshift, which may be another one now.
    if (present.uncertainty?.kind === 'percentiles' && redshift === undefined)
      return { ok: true, uncertainty: undefined };
    return checked(movedWithRedshift(present.uncertainty, present.redshift, redshift ?? present.redshift));
  }
  if (text === '') return { ok: true, uncertainty: null };
  const plain = normaliseMinus(text);
  const sigma = SYMMETRIC.exec(plain)?.[1];
  if (sigma !== undefined) {
    if (Number(sigma) > 0) return checked({ kind: 'gaussian', sigma: Number(sigma) });
    return { ok: true, uncertainty: null, warning: 'An uncertainty of 0 says that it is not known; none is kept.' };
  }
  const [, medianUp, up, down] = UP_DOWN.exec(plain) ?? [];
  const [, medianDown, downFirst, upLast] = DOWN_UP.exec(plain) ?? [];
  const above = up ?? upLast;
  const below = down ?? downFirst;
  if (above !== undefined && below !== undefined) {
    const given = medianUp ?? medianDown;
    const median = given === undefined ? redshift : Number(given);
    if (median === undefined) return { ok: true, uncertainty: undefined };
    // Also keeps an exponent of a million digits away from exact sums.
    if (![above, below].every((distance) => Number(distance) > 0 && Number(distance) <= HIGHEST_REDSHIFT)) {
      return refuse(`Both distances are above 0, and at most ${HIGHEST_REDSHIFT}. Write it like ${EXAMPLES}.`);
    }
    if (Number(below) >= median) {
      return refuse(`The 16th percentile would lie at or below 0: ${below} is not below the redshift.`);
    }
    return checked({
      kind: 'percentiles',
      p16: Number(subtractDecimals(median, below)),
      p50: median,
      p84: Number(addDecimals(median, above)),
    });
  }
  if (DISTRIBUTION.test(plain)) {
    return refuse('A distribution cannot be typed into a cell: upload its table, or write its width here.');
  }
  return refuse(`"${text.length > 40 ? `${text.slice(0, 39)}…` : text}" is no uncertainty. Write it like ${EXAMPLES}.`);
}

function checked(uncertainty: RedshiftUncertainty | null): UncertaintyParsing {
  const parsed = RedshiftUncertainty.nullable().safeParse(uncertainty);
  if (parsed.success) return { ok: true, uncertainty: parsed.data };
  return refuse(`${parsed.error.issues[0]?.message ?? 'Out of range.'} Write it like ${EXAMPLES}.`);
}

function refuse(message: string): UncertaintyParsing {
  return { ok: false, message };
}

/** Percentiles around a redshift stay around it when it is corrected; a distribution says by itself where it lies. */
export function movedWithRedshift(
  uncertainty: RedshiftUncertainty | null,
  before: number,
  after: number,
): RedshiftUncertainty | null {
  if (uncertainty?.kind !== 'percentiles' || uncertainty.p50 !== before || before === after) return uncertainty;
  const { p16, p84 } = uncertainty;
  return {
    kind: 'percentiles',
    p16: Number(subtractDecimals(after, subtractDecimals(before, p16))),
    p50: after,
    p84: Number(addDecimals(after, subtractDecimals(p84, before))),
  };
}

/** As the grid shows and takes it, with all its digits: `0.02`, `+0.05 −0.03`, `7.1 +0.05 −0.03`, `p(z), 2 peaks`. */
export function formatRedshiftUncertainty(uncertainty: RedshiftUncertainty | null, redshift: number): string {
  switch (uncertainty?.kind) {
    case undefined:
      return '';
    case 'gaussian':
      return String(uncertainty.sigma);
    case 'percentiles': {
      const { p16, p50, p84 } = uncertainty;
      const median = p50 === redshift ? '' : `${p50} `;
      return `${median}+${subtractDecimals(p84, p50)} −${subtractDecimals(p50, p16)}`;
    }
    case 'table': {
      const { length } = redshiftDistribution(redshift, uncertainty).peaks;
      return `p(z), ${length} ${length === 1 ? 'peak' : 'peaks'}`;
    }
  }
}
