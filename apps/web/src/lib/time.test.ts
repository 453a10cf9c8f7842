import { expect, it } from 'vitest';
import { describeInstant, formatAgo, formatRemaining } from './time';

it('names UTC, site and own time, and repeats the date only where it differs', () => {
  const instant = new Date('2027-03-31T18:00:00Z');
  // Chile leaves summer time on the first Sunday of April: on 31 March the site is three hours behind UTC.
  expect(describeInstant(instant, 'America/Santiago', 'Asia/Tokyo')).toBe(
    '2027-03-31 18:00 UTC · 15:00 site · 2027-04-01 03:00 your time',
  );
});

it.each([
  [6 * 86_400_000 + 4 * 3_600_000, '6 d 04 h'],
  [4 * 3_600_000 + 12 * 60_000, '4 h 12 min'],
  [3 * 60_000 + 5_000, '3 min 05 s'],
  [-1, 'passed'],
])('says that %d ms remain as %s', (milliseconds, text) => {
  expect(formatRemaining(milliseconds)).toBe(text);
});

it('says how long ago', () => {
  expect([0, 12_000, 300_000, 7_200_000, 200_000_000].map(formatAgo)).toEqual([
    'just now',
    '12 s ago',
    '5 min ago',
    '2 h ago',
    '2 d ago',
  ]);
});
