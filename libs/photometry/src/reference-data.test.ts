/** Bands, lines, atmosphere and the checks of reference files, on the files in the repository. */
import { describe, expect, it } from 'vitest';
import { photometryFiles, referenceContents } from '../../../tests/factories/photometry-files.js';
import { ATMOSPHERE_HIGH_NM, ATMOSPHERE_LOW_NM, atmosphericRangeAt, createAtmosphere } from './atmosphere-data.js';
import { abFromVegaIn, BAND_IDS, createBands, findBandIn, vegaFromAbIn } from './band-data.js';
import { halfPowerEdgesNm } from './synthetic.js';
import { createLines, LINE_IDS } from './line-data.js';
import { PHOTOMETRY_FILE_NAMES, photometryFilesFrom, referenceMetaOf, ReferenceFileError } from './reference-files.js';
import { curveValueAt, sampledCurve } from './sampled-curve.js';

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

  it('turn a Vega magnitude into AB and back, where they have an offset', () => {
    expect(abFromVegaIn(bands.Ks, 20)).toBeCloseTo(21.85, 12);
    expect(vegaFromAbIn(bands.Ks, 21.85)).toBeCloseTo(20, 12);
    expect(abFromVegaIn(bands.g, 20)).toBeUndefined();
    expect(vegaFromAbIn(bands.g, 20)).toBeUndefined();
  });

  it('are told apart by case, and unknown ones are not found', () => {
    expect(findBandIn(bands, 'r')).toBe(bands.r);
    expect(findBandIn(bands, 'R')).toBe(bands.R);
    expect(findBandIn(bands, 'toString')).toBeUndefined();
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

describe('lines', () => {
  const lines = createLines(files.lines);

  it('are all there, by wavelength', () => {
    expect(lines.map(({ id }) => id).sort()).toEqual([...LINE_IDS].sort());
    expect(lines.map((line) => line.vacuumWavelengthNm)).toEqual(
      lines.map((line) => line.vacuumWavelengthNm).sort((a, b) => a - b),
    );
  });

  it.each([
    // SI: c / 1900.5369 GHz. Vacuum wavelengths of public lists.
    ['CII_158um', 299_792_458 / 1900.5369],
    ['Lya', 121.567],
    ['OIII_5008', 500.824],
    ['Ha', 656.461],
  ] as const)('%s is at %d nm within the scatter of public lists', (id, wavelengthNm) => {
    const line = lines.find((each) => each.id === id)!;
    expect(Math.abs(line.vacuumWavelengthNm - wavelengthNm)).toBeLessThanOrEqual(line.spreadNm);
  });

  it('refuse a table that lacks one or has one twice', () => {
    const [first, ...rest] = files.lines.data.lines;
    expect(() => createLines({ data: { lines: rest } })).toThrow(`complete: ${first!.id} missing`);
    expect(() => createLines({ data: { lines: [first!, ...rest, first!] } })).toThrow('in the table once');
  });
});

describe('the atmosphere', () => {
  const ranges = createAtmosphere(files.atmosphere);

  it('has one range for every wavelength between its ends, and none outside', () => {
    for (let nm = ATMOSPHERE_LOW_NM; nm < ATMOSPHERE_HIGH_NM; nm++) {
      expect(ranges.filter(({ lowNm, highNm }) => nm >= lowNm && nm < highNm)).toHaveLength(1);
    }
    expect(atmosphericRangeAt(ranges, ATMOSPHERE_LOW_NM - 0.01)).toBeUndefined();
    expect(atmosphericRangeAt(ranges, ATMOSPHERE_HIGH_NM)).toBeUndefined();
  });

  it.each([
    ['Hα at z = 0', 656.46, 'window', undefined],
    ['Hα at z = 0.05', 689.3, 'gap', 'partial'],
    ['the oxygen A band', 761, 'gap', 'opaque'],
    ['Hα at z = 1.1', 1378.6, 'gap', 'opaque'],
    ['Hα at z = 1.5', 1641, 'window', undefined],
    ['[O III] at z = 2.7', 1853, 'gap', 'opaque'],
    ['Hα at z = 2.3', 2166, 'window', undefined],
    ['beyond K', 2700, 'gap', 'opaque'],
  ] as const)('finds %s, %d nm, in a %s', (_, observedNm, kind, depth) => {
    expect(atmosphericRangeAt(ranges, observedNm)).toMatchObject({ kind, ...(depth ? { depth } : {}) });
  });

  it('refuses a hole, an overlap and a range without width', () => {
    const [first, second, ...rest] = files.atmosphere.data.windows;
    const make = (windows: readonly unknown[]) => () => createAtmosphere({ data: { windows } as never });
    expect(make([first, ...rest])).toThrow('where the last ended');
    expect(make([first, { ...second, lowNm: second!.lowNm - 1 }, ...rest])).toThrow('where the last ended');
    expect(make([first, { ...second, highNm: second!.lowNm }, ...rest])).toThrow('highNm');
    expect(make([first, second])).toThrow('5500');
    expect(make([{ ...first, depth: undefined }, second, ...rest])).toThrow('depth');
  });
});

describe('reference files', () => {
  const contents = referenceContents();

  /** The files with what stands at a path in one of them replaced. */
  function changed(file: string, path: string, replace: (value: unknown) => unknown): Map<string, unknown> {
    const content = structuredClone(contents.get(file)) as object;
    const keys = path.split('.');
    const last = keys.pop()!;
    const holder = keys.reduce<object>((value, key) => Reflect.get(value, key) as object, content);
    Reflect.set(holder, last, replace(Reflect.get(holder, last)));
    return new Map(contents).set(file, content);
  }
  const reversed = (value: unknown) => (value as unknown[]).toReversed();
  const shortened = (value: unknown) => (value as unknown[]).slice(0, -1);
  const firstTwice = (value: unknown) => [(value as unknown[])[0], ...(value as unknown[])];

  it('are all read', () => {
    expect(Object.keys(files).sort()).toEqual(Object.keys(PHOTOMETRY_FILE_NAMES).sort());
  });

  it('are refused by name when one is missing', () => {
    const without = new Map(contents);
    without.delete('bands.json');
    expect(() => photometryFilesFrom(without)).toThrow('Reference data bands.json: is missing');
  });

  it.each<[what: string, file: string, words: string, path: string, replace: (value: unknown) => unknown]>([
    ['a blank licence', 'lines.json', 'meta.licence', 'meta.licence', () => ' '],
    ['an invented provenance', 'lines.json', 'meta.provenance', 'meta.provenance', () => 'hearsay'],
    ['an unknown key', 'bands.json', 'data.bands.0', 'data.bands.0.colour', () => 'blue'],
    ['a response above 1', 'bands.json', 'response.3', 'data.bands.0.response.3', () => 1.2],
    ['a curve out of order', 'bands.json', 'wavelengthsNm.1', 'data.bands.2.wavelengthsNm', reversed],
    ['a band twice', 'bands.json', 'in the table once', 'data.bands', firstTwice],
    ['a line without wavelength', 'lines.json', 'vacuumWavelengthNm', 'data.lines.0.vacuumWavelengthNm', () => 0],
    ['an atmosphere cut short', 'atmosphere-windows.json', '5500', 'data.windows', shortened],
    ['a changed dust law', 'dust-laws.json', 'differs', 'data.calzetti2000.scale', () => 2.695],
    ['a dust law left out', 'dust-laws.json', 'differs', 'data.ccm1989', () => undefined],
    ['a dust law too many', 'dust-laws.json', 'differs', 'data.another', () => ({})],
    [
      'a coefficient too few',
      'igm-inoue2014.json',
      'each of the 39 lines',
      'data.lineSeries.0.branches.1.coefficients',
      shortened,
    ],
    ['lines out of order', 'igm-inoue2014.json', 'descend', 'data.lineWavelengthsNm', reversed],
    ['branches out of order', 'igm-inoue2014.json', 'branches must ascend', 'data.lineSeries.0.branches', reversed],
    ['epochs out of order', 'igm-inoue2014.json', 'epochs must ascend', 'data.continuum.0.epochs', reversed],
    ['the other model', 'igm-madau1995.json', 'data.id', 'data.id', () => 'inoue2014'],
    ['a template cut short', 'template-supernova-ia-hsiao.json', 'each phase', 'data.phasesDays', shortened],
  ])('are refused with %s', (_, file, words, path, replace) => {
    const read = () => photometryFilesFrom(changed(file, path, replace));
    expect(read).toThrow(ReferenceFileError);
    expect(read).toThrow(`Reference data ${file}: `);
    expect(read).toThrow(words);
  });

  it('are accepted with keys in another order, and with files that photometry does not know', () => {
    const reordered = changed('dust-laws.json', 'data', (data) =>
      Object.fromEntries(Object.entries(data as object).reverse()),
    );
    expect(photometryFilesFrom(reordered.set('other.json', {})).dustLaws.data).toEqual(files.dustLaws.data);
  });

  it('have their description read without their data', () => {
    const { meta } = contents.get('lines.json') as { meta: unknown };
    expect(referenceMetaOf('new.json', { meta, data: 'anything' })).toEqual(meta);
    expect(() => referenceMetaOf('new.json', { data: 'anything' })).toThrow('Reference data new.json: meta');
  });
});
