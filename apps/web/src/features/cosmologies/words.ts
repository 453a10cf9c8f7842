import type { ProposalCosmologies } from '@faintward/contracts/light-report';
import { counted, formatDuration, formatNumber } from '../../lib/format';

type Row = ProposalCosmologies['rows'][number];

/** "+1 h 12 min (+2.4 %), in 5 observations". */
export function changeText(row: Row, chosen: Row): string {
  if (row.isChosen) return 'as asked';
  const seconds = row.requestedSeconds - chosen.requestedSeconds;
  if (row.changedObservationCount === 0 && Math.abs(seconds) < 1) return 'none';
  const percent =
    chosen.requestedSeconds > 0
      ? ` (${formatNumber((100 * seconds) / chosen.requestedSeconds, { decimals: 1, signed: true })} %)`
      : '';
  const sign = Math.abs(seconds) < 1 ? '' : seconds < 0 ? '−' : '+';
  const where = row.changedObservationCount > 0 ? `, in ${counted(row.changedObservationCount, 'observation')}` : '';
  return `${sign}${formatDuration(Math.abs(seconds))}${percent}${where}`;
}

/** How many observations cannot be done any more, or can be done now. */
export function infeasibleText(row: Row, chosen: Row): string {
  const more = row.infeasibleCount - chosen.infeasibleCount;
  if (row.isChosen)
    return row.infeasibleCount === 0 ? 'all feasible' : `${counted(row.infeasibleCount, 'observation')} not feasible`;
  if (more > 0) return `${counted(more, 'observation')} newly infeasible`;
  if (more < 0) return `${counted(-more, 'observation')} feasible instead`;
  return 'no change';
}

/** Which targets' time depends on the cosmology at all, and why. */
export function whatDependsText({ targetCount, apparentCount, intrinsicCount }: ProposalCosmologies): string {
  const why =
    'Where the apparent brightness is given, the light that arrives is known and a cosmology changes no exposure time, except through a size that is given in kiloparsec.';
  if (targetCount === 0) return why;
  if (apparentCount === targetCount) return `All targets are given by their apparent brightness. ${why}`;
  const intrinsic = `${counted(intrinsicCount, 'target')} ${intrinsicCount === 1 ? 'is' : 'are'} given by what ${
    intrinsicCount === 1 ? 'it emits' : 'they emit'
  }: farther is fainter there, and asks for more time.`;
  const apparent = `${counted(apparentCount, 'target')} ${apparentCount === 1 ? 'is' : 'are'} given by ${
    apparentCount === 1 ? 'its' : 'their'
  } apparent brightness. ${why}`;
  // The others have no brightness yet.
  if (intrinsicCount === 0) return apparentCount === 0 ? why : apparent;
  return apparentCount === 0 ? `${intrinsic} ${why}` : `${apparent} ${intrinsic}`;
}
