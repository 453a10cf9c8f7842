import { describe, expect, it } from 'vitest';
import { labelPrefixes } from '../../../apps/api/src/modules/semesters/semester-rules.js';
import { civilDateAt, stageOf } from '../../../apps/api/src/modules/semesters/semester-stage.js';

const DATES = {
  callOpensAt: new Date('2027-05-01T12:00:00Z'),
  deadlineAt: new Date('2027-06-15T12:00:00Z'),
  decidedAt: new Date('2027-08-01T09:00:00Z'),
  startsOn: '2027-10-01',
  endsOn: '2028-03-31',
};

describe('the stage of a semester', () => {
  it.each([
    ['2027-05-01T11:59:59Z', 'announced'],
    ['2027-05-01T12:00:00Z', 'open'],
    ['2027-06-15T11:59:59Z', 'open'],
    ['2027-06-15T12:00:00Z', 'reviewing'],
    ['2027-08-01T08:59:59Z', 'reviewing'],
    ['2027-08-01T09:00:00Z', 'decided'],
    // Midnight at the site, three hours behind UTC.
    ['2027-10-01T02:59:59Z', 'decided'],
    ['2027-10-01T03:00:00Z', 'observing'],
    ['2028-04-01T02:59:59Z', 'observing'],
    ['2028-04-01T03:00:00Z', 'closed'],
  ])('at %s is %s', (now, stage) => {
    expect(stageOf(DATES, 'Etc/GMT+3', new Date(now))).toBe(stage);
  });

  it('stays in review, undecided, even after its nights have begun', () => {
    expect(stageOf({ ...DATES, decidedAt: null }, 'UTC', new Date('2028-01-01T00:00:00Z'))).toBe('reviewing');
  });

  it('follows the calendar of the site, not of UTC', () => {
    expect(civilDateAt(new Date('2027-10-01T02:00:00Z'), 'Etc/GMT+3')).toBe('2027-09-30');
    expect(civilDateAt(new Date('2027-09-30T16:00:00Z'), 'Pacific/Auckland')).toBe('2027-10-01');
  });
});

describe('the label prefix of a semester', () => {
  it('is the year and month in which it begins, then with a letter where that is taken', () => {
    expect(labelPrefixes('2027-04-01').slice(0, 3)).toEqual(['2704', '2704B', '2704C']);
    expect(labelPrefixes('2027-10-01').slice(0, 3)).toEqual(['2710', '2710B', '2710C']);
  });
});
