/** The atmosphere and the checks of reference files, on the files in the repository. */
import { describe, expect, it } from 'vitest';
import { photometryFiles, referenceContents } from '../../../tests/factories/photometry-files.js';
import { ATMOSPHERE_HIGH_NM, ATMOSPHERE_LOW_NM, atmosphericRangeAt, createAtmosphere } from './atmosphere-data.js';
import { PHOTOMETRY_FILE_NAMES, photometryFilesFrom, referenceMetaOf, ReferenceFileError } from './reference-files.js';

const files = photometryFiles();

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
    ['a dust law left out', 'dust-laws.json', 'each of', 'data.laws', shortened],
    ['a dust law twice', 'dust-laws.json', 'each of', 'data.laws', firstTwice],
    ['a dust law that nobody knows', 'dust-laws.json', 'laws.0', 'data.laws.0', () => 'mine'],
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
    const reordered = changed('typical-values.json', 'data', (data) =>
      Object.fromEntries(Object.entries(data as object).reverse()),
    );
    expect(photometryFilesFrom(reordered.set('other.json', {})).typicalValues.data).toEqual(files.typicalValues.data);
  });

  it('have their description read without their data', () => {
    const { meta } = contents.get('lines.json') as { meta: unknown };
    expect(referenceMetaOf('new.json', { meta, data: 'anything' })).toEqual(meta);
    expect(() => referenceMetaOf('new.json', { data: 'anything' })).toThrow('Reference data new.json: meta');
  });
});
