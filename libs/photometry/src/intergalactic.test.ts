/**
 * Check values of tests/reference/dust-igm.json. Optical depths to 1e-9 relative: both sides sum the same published
 * terms. Transmission on nodes against the term-by-term sum to 1e-12 relative, which is rounding.
 */
import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  createInoue2014,
  createMadau1995,
  forestNodesNm,
  type IntergalacticMedium,
  type IntergalacticTable,
} from './intergalactic.js';

interface IgmRow {
  z: number;
  rest_A: number;
  inoue2014_tau: number;
  madau1995_tau: number;
  madau1995_transmission_with_metals: number;
}
interface MeanRow {
  z: number;
  inoue2014_mean_transmission_1050_1170: number;
  madau1995_mean_transmission_1050_1170: number;
}

function read(path: string): unknown {
  return JSON.parse(readFileSync(new URL(`../../../${path}`, import.meta.url), 'utf8'));
}
function table(file: string): IntergalacticTable {
  return (read(`seed/reference/${file}`) as { data: IntergalacticTable }).data;
}

const reference = read('tests/reference/dust-igm.json') as { igm: IgmRow[]; igm_forest_mean: MeanRow[] };
const inoue = createInoue2014(table('igm-inoue2014.json'));
const madau = createMadau1995(table('igm-madau1995.json'));
const madauWithMetals = createMadau1995(table('igm-madau1995.json'), { withMetals: true });
const media: readonly [string, IntergalacticMedium][] = [
  ['Inoue 2014', inoue],
  ['Madau 1995', madau],
  ['Madau 1995 with metals', madauWithMetals],
];

function expectRelative(value: number, expected: number, tolerance: number, what: string): void {
  expect(Math.abs(value - expected), `${what}: ${value} for ${expected}`).toBeLessThanOrEqual(
    tolerance * Math.abs(expected),
  );
}

function transmissionOf(medium: IntergalacticMedium, restNm: number[], redshift: number): number[] {
  const out = new Float64Array(restNm.length);
  medium.onNodes(Float64Array.from(restNm)).transmission(redshift, out);
  return [...out];
}

describe('optical depth', () => {
  it('equals the reference values', () => {
    expect(reference.igm.length).toBeGreaterThan(400);
    for (const row of reference.igm) {
      const observedNm = (row.rest_A / 10) * (1 + row.z);
      const what = `${row.rest_A} Å at z = ${row.z}`;
      expectRelative(inoue.opticalDepth(observedNm, row.z), row.inoue2014_tau, 1e-9, `Inoue, ${what}`);
      expectRelative(madau.opticalDepth(observedNm, row.z), row.madau1995_tau, 1e-9, `Madau, ${what}`);
      const withMetals = Math.exp(-madauWithMetals.opticalDepth(observedNm, row.z));
      expectRelative(withMetals, row.madau1995_transmission_with_metals, 1e-9, `Madau with metals, ${what}`);
    }
  });

  it('averages to the reference transmissions between 105 and 117 nm', () => {
    const restNm = Array.from({ length: 1201 }, (_, i) => 105 + i / 100);
    for (const row of reference.igm_forest_mean) {
      const mean = (medium: IntergalacticMedium) =>
        transmissionOf(medium, restNm, row.z).reduce((sum, each) => sum + each, 0) / restNm.length;
      expectRelative(mean(inoue), row.inoue2014_mean_transmission_1050_1170, 1e-9, `Inoue at z = ${row.z}`);
      expectRelative(mean(madau), row.madau1995_mean_transmission_1050_1170, 1e-9, `Madau at z = ${row.z}`);
    }
  });

  it('counts a line strictly between its rest wavelength and its wavelength at the source', () => {
    const lymanAlphaNm = 121.567;
    expect(inoue.opticalDepth(lymanAlphaNm * 4, 3)).toBe(0);
    const atRatioFour = 0.00235379 * 4 ** 3.7 + 5.38995e-5 * 4 ** 3;
    expect(inoue.opticalDepth(lymanAlphaNm * 4 * (1 - 1e-15), 3)).toBeCloseTo(atRatioFour, 12);
    // At its own rest wavelength Lyα stops to act: what is left at 121.567 nm observed are the other lines.
    const [at, above] = [lymanAlphaNm, lymanAlphaNm * (1 + 1e-15)].map((nm) => inoue.opticalDepth(nm, 3));
    expect(above! - at!).toBeCloseTo(0.0168976 + 0.000161698, 8);
  });

  it.each(media)('of %s is never negative and vanishes at z = 0', (_, medium) => {
    fc.assert(
      fc.property(
        fc.double({ min: 30, max: 3000, noNaN: true }),
        fc.double({ min: 0, max: 20, noNaN: true }),
        (nm, z) => {
          expect(medium.opticalDepth(nm, z)).toBeGreaterThanOrEqual(0);
          expect(medium.opticalDepth(nm, 0)).toBe(0);
        },
      ),
    );
  });

  it.each(media)('of %s refuses what is not a redshift or a wavelength', (_, medium) => {
    expect(() => medium.opticalDepth(500, -0.1)).toThrow('redshift');
    expect(() => medium.opticalDepth(0, 3)).toThrow('observedNm');
  });
});

describe('transmission on nodes', () => {
  it('is the same from any node on', () => {
    const nodesNm = Float64Array.from({ length: 400 }, (_, i) => 60 * Math.exp(i * 2e-3));
    for (const medium of [inoue, madau]) {
      const onNodes = medium.onNodes(nodesNm);
      for (const redshift of [0.5, 3, 6.5]) {
        const all = new Float64Array(400);
        onNodes.transmission(redshift, all);
        for (const first of [1, 150, 353, 399, 400]) {
          const part = new Float64Array(400 - first).fill(7);
          onNodes.transmission(redshift, part, first);
          expect(part).toEqual(all.slice(first));
        }
      }
    }
    expect(() => inoue.onNodes(nodesNm).transmission(1, new Float64Array(400), 1)).toThrow('out.length');
  });

  it.each(media)('of %s equals the sum over single terms', (_, medium) => {
    const nodes = fc.array(fc.double({ min: 10, max: 130, noNaN: true }), { minLength: 1, maxLength: 60 });
    fc.assert(
      fc.property(nodes, fc.double({ min: 0, max: 16, noNaN: true }), (unsorted, redshift) => {
        const restNm = [...new Set(unsorted)].sort((a, b) => a - b);
        transmissionOf(medium, restNm, redshift).forEach((transmission, i) => {
          const depth = medium.opticalDepth(restNm[i]! * (1 + redshift), redshift);
          // An error in τ is the relative error of e^−τ.
          const tolerance = 1e-12 * Math.max(1, depth);
          expectRelative(transmission, Math.exp(-depth), tolerance, `${restNm[i]} nm at z = ${redshift}`);
        });
      }),
      { numRuns: 2000 },
    );
  });

  it.each(media)('of %s takes the first of two equal nodes as left of a jump, the second as right', (_, medium) => {
    for (const jumpNm of forestNodesNm(medium)) {
      for (const redshift of [0.7, 2.5, 4, 6]) {
        const transmissions = transmissionOf(
          medium,
          [jumpNm * (1 - 1e-12), jumpNm, jumpNm, jumpNm * (1 + 1e-12)],
          redshift,
        );
        const [left, first, second, right] = transmissions as [number, number, number, number];
        expectRelative(first, left, 1e-9, `left of ${jumpNm} nm`);
        expectRelative(second, right, 1e-9, `right of ${jumpNm} nm`);
        // Rounded coefficients let the continuum begin at 1e-5 (1 + z)³ in place of 0; at a line something is absorbed.
        if (jumpNm === medium.jumpsRestNm[0])
          expect(Math.abs(second - first)).toBeLessThan(1.5e-5 * (1 + redshift) ** 3);
        else expect(second).toBeGreaterThan(first);
        const single = transmissionOf(medium, [jumpNm], redshift);
        expect(single).toEqual([second]);
      }
    }
  });

  it('jumps at 39 lines and has the limit among its nodes', () => {
    const nodes = forestNodesNm(inoue);
    expect(nodes).toHaveLength(40);
    expect(nodes[0]).toBe(91.18);
    expect(nodes[39]).toBe(121.567);
    expect(nodes).toEqual([...nodes].sort((a, b) => a - b));
  });

  it('is exactly 1 redward of Lyα, and written over whatever was in the array', () => {
    const out = Float64Array.of(7, 7, 7, 7);
    const onNodes = inoue.onNodes(Float64Array.of(110, 121.567, 121.568, 5000));
    onNodes.transmission(5, out);
    expect(out[0]).toBeLessThan(0.4);
    expect([...out.subarray(1)]).toEqual([1, 1, 1]);
    const before = [...out];
    onNodes.transmission(0, out);
    expect([...out]).toEqual([1, 1, 1, 1]);
    onNodes.transmission(5, out);
    expect([...out]).toEqual(before);
  });

  it('falls with redshift in the forest', () => {
    const redshifts = Array.from({ length: 60 }, (_, i) => i * 0.15);
    const along = redshifts.map((z) => transmissionOf(inoue, [115], z)[0]!);
    along.slice(1).forEach((transmission, i) => expect(transmission).toBeLessThanOrEqual(along[i]!));
  });

  it('refuses nodes out of order and an array of another length', () => {
    expect(() => inoue.onNodes(Float64Array.of(100, 99))).toThrow('restNm.1');
    expect(() => inoue.onNodes(Float64Array.of(100)).transmission(3, new Float64Array(2))).toThrow('out.length');
  });
});
