import type { FeasibleEstimate } from '@faintward/contracts/estimates';
import { expect, it } from 'vitest';
import { anObservation } from '../../../testing/proposalExamples';
import { shortConditions } from '../plan';
import { noticeOf, observationRowHeight } from './observationColumns';

const notice = (severity: 'note' | 'warning' | 'error', message: string) => ({ code: message, message, severity });

function withNotices(...notices: ReturnType<typeof notice>[]) {
  // Of an estimate only what the column reads.
  const estimate = { outcome: 'feasible', notices } as unknown as FeasibleEstimate;
  return anObservation({ estimate });
}

it('writes the most severe caution out, counts the others, and leaves notes to the sheet', () => {
  const row = withNotices(notice('note', 'Hint.'), notice('warning', 'Faint.'), notice('error', 'It saturates.'));
  expect(noticeOf(row)).toEqual({
    text: 'It saturates. And 1 other.',
    all: 'It saturates. Faint.',
    tone: 'error.main',
  });
  expect(noticeOf(withNotices(notice('note', 'Hint.')))).toBeUndefined();
  expect(noticeOf({ ...row, estimate: null, lacking: 'No brightness yet.' })?.text).toBe('No brightness yet.');
  expect(observationRowHeight(row)).toBeGreaterThan(observationRowHeight(withNotices()));
});

it('writes conditions as limits, and keeps each line together', () => {
  expect(shortConditions({ seeingArcsec: 0.85, airmass: 1.2, moonClass: 'dark', transparency: 'thinCloud' })).toBe(
    '≤\u00a00.85″\u00a0·\u00a0X\u00a0≤\u00a01.2 · dark\u00a0·\u00a0thin\u00a0cloud',
  );
});
