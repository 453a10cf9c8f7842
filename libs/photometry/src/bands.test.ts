import { describe, expect, it } from 'vitest';
import { photometryFiles } from '../../../tests/factories/photometry-files.js';
import { BAND_IDS, createBands } from './bands.js';
import { curveValueAt, sampledCurve } from './sampled-curve.js';
import { halfPowerEdgesNm } from './synthetic.js';

const files = photometryFiles();

describe('bands', () => {
  const bands = createBands(files.bands);

  it('are all there, with a source for everything they state', () => {
    expect(Object.keys(bands).sort()).toEqual([...BAND_IDS].sort());
    for (const band of Object.values(bands)) {
      expect(band.vegaToAbMag === null).toBe(band.vegaToAbSource === null);
      expect(band.vegaToAbMag === null).toBe(band.vegaToAbProvenance === null);
      expect(Math.max(...band.curve.values)).toBe(1);
    }
  });

  it.each([
    ['u', 325, 385],
    ['g', 400, 550],
    ['r', 555, 690],
    ['i', 695, 820],
    ['z', 825, 925],
    ['Y', 970, 1070],
    ['J', 1170, 1330],
    ['H', 1490, 1780],
    ['Ks', 2000, 2300],
  ] as const)('%s is planned between %d and %d nm at half power', (id, lowNm, highNm) => {
    expect([bands[id].wavelengthLowNm, bands[id].wavelengthHighNm]).toEqual([lowNm, highNm]);
    expect(curveValueAt(bands[id].curve, lowNm * 0.98)).toBeCloseTo(0, 9);
    expect(curveValueAt(bands[id].curve, lowNm * 1.02)).toBeCloseTo(1, 9);
    expect(bands[id].pivotWavelengthNm / Math.sqrt(lowNm * highNm)).toBeCloseTo(1, 1);
    expect(bands[id].curveProvenance).toBe('commonPractice');
  });

  it.each([
    // Pivot wavelengths of the later UBVRI responses of Bessell & Murphy 2012, from memory: 1 % apart at most.
    ['U', 359.8],
    ['B', 437.7],
    ['V', 548.8],
    ['R', 651.6],
    ['I', 798.1],
  ] as const)('%s has its pivot wavelength near %d nm', (id, pivotNm) => {
    expect(Math.abs(bands[id].pivotWavelengthNm / pivotNm - 1)).toBeLessThan(0.01);
  });

  it('hold the published energy response divided by wavelength', () => {
    // Bessell 1990, table 2, V: 0.458, 1, 0.461 at 500, 530 and 590 nm; the ratio of energies per photon is 530/λ.
    const { curve } = bands.V;
    expect(curveValueAt(curve, 500)).toBeCloseTo((0.458 * 530) / 500, 5);
    expect(curveValueAt(curve, 530)).toBe(1);
    expect(curveValueAt(curve, 590)).toBeCloseTo((0.461 * 530) / 590, 5);
  });

  it.each([
    // Blanton & Roweis 2007, AJ 133, 734; U, R and I from memory.
    ['U', 0.79],
    ['B', -0.09],
    ['V', 0.02],
    ['R', 0.21],
    ['I', 0.45],
    ['J', 0.91],
    ['H', 1.39],
    ['Ks', 1.85],
  ] as const)('%s is %d mag fainter in AB than in Vega', (id, offset) => {
    expect(bands[id].vegaToAbMag).toBe(offset);
  });

  it('have no Vega offset where magnitudes are AB anyway', () => {
    expect((['u', 'g', 'r', 'i', 'z', 'Y'] as const).map((id) => bands[id].vegaToAbMag)).toEqual(Array(6).fill(null));
  });

  it('have half-power edges between points, and at the ends of a curve that begins above half', () => {
    expect(halfPowerEdgesNm(sampledCurve([400, 500, 600, 800], [0, 1, 1, 0]))).toEqual([450, 700]);
    expect(halfPowerEdgesNm(sampledCurve([400, 500], [1, 1]))).toEqual([400, 500]);
  });

  it('refuse a table that lacks one or has one twice', () => {
    const [first, ...rest] = files.bands.data.bands;
    expect(() => createBands({ data: { bands: rest } })).toThrow(`complete: ${first!.id} missing`);
    expect(() => createBands({ data: { bands: [first!, first!, ...rest] } })).toThrow('in the table once');
  });
});
