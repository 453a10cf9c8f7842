import { describe, expect, it } from 'vitest';
import { readRedshiftDistribution } from '../../../apps/api/src/modules/light/redshift-distribution-text.js';
import { DomainError } from '../../../apps/api/src/platform/domain-error.js';

const fault = async (text: string): Promise<string> => {
  try {
    await readRedshiftDistribution(text);
  } catch (error) {
    if (!(error instanceof DomainError)) throw error;
    expect(error.details.fieldErrors?.[0]?.path).toBe('text');
    return error.detail;
  }
  throw new Error('It was read.');
};

describe('a distribution of a redshift', () => {
  it('is read from two columns, in any order, and told as percentiles and peaks', async () => {
    // Two triangles: a quarter of the area at 1, three quarters at 7.
    const reading = await readRedshiftDistribution('# fitted\nz,p(z)\n8,0\n7,3\n6,0\n1.5,0\n1,2\n0.5,0\n');
    expect(reading.uncertainty).toEqual({
      kind: 'table',
      redshifts: [0.5, 1, 1.5, 6, 7, 8],
      densities: [0, 2, 0, 0, 3, 0],
    });
    expect(reading.peaks).toEqual([
      { redshift: 7, probability: expect.closeTo(0.75, 12) },
      { redshift: 1, probability: expect.closeTo(0.25, 12) },
    ]);
    // The median lies where a third of the upper triangle is passed: 6 + √(2/3).
    expect(reading.quantiles.p50).toBeCloseTo(6 + Math.sqrt(2 / 3), 12);
    expect(reading.quantiles.p16).toBeLessThan(1.5);
    expect(reading.notices).toEqual([]);
  });

  it('says that further columns are left out', async () => {
    expect((await readRedshiftDistribution('1 2 9\n2 3 9\n3 1 9')).notices).toMatchObject([{ code: 'moreColumns' }]);
  });

  it.each([
    ['', /empty/],
    ['1\n2\n3', /two columns/],
    ['1,2', /two points/],
    ['1,2\n2,x', /Row 2: "x" is not a number/],
    ['1,2\n2,NaN', /Row 2/],
    ['1,2\n2,-1', /Row 2: a probability density is 0 or more/],
    ['1,2\n31,1', /Row 2: a redshift lies between/],
    ['1,2\n2,1\n1,3', /Rows 1 and 3 have the same redshift/],
    ['1,0\n2,0', /above 0 somewhere/],
    ['1,1\n1.0000000000001,1', /narrower than about 1e-9/],
    ['\n'.repeat(7000), /more than 6000 lines/],
    [Array.from({ length: 5002 }, (_, index) => `${index / 1000},1`).join('\n'), /5000/],
  ])('is refused (case %#)', async (text, message) => {
    expect(await fault(text)).toMatch(message);
  });
});
