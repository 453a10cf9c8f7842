import { NewSpectrum } from '@faintward/contracts/light-report';
import { airFromVacuumNm } from '@faintward/photometry';
import { describe, expect, it } from 'vitest';
import { readSpectrumText } from '../../../apps/api/src/modules/spectra/spectrum-text.js';
import { DomainError } from '../../../apps/api/src/platform/domain-error.js';

const read = (text: string, options: object = {}) =>
  readSpectrumText(NewSpectrum.parse({ name: 'Invented', text, ...options }));
const fault = async (text: string, options: object = {}): Promise<string> => {
  try {
    await read(text, options);
  } catch (error) {
    if (!(error instanceof DomainError)) throw error;
    expect(error.details.fieldErrors?.[0]?.path).toBe('text');
    return error.detail;
  }
  throw new Error('It was read.');
};

/** Twelve points of a flat spectrum from 400 nm, in the unit given. */
const flat = (perNm = 1, delimiter = ' ', from = 400) =>
  Array.from({ length: 12 }, (_, index) => `${(from + 20 * index) * perNm}${delimiter}${index + 1}`).join('\n');
const expected = Array.from({ length: 12 }, (_, index) => 400 + 20 * index);

describe('the text of a spectrum', () => {
  it.each([
    ['blanks', flat()],
    ['commas and a header', `wavelength_nm,flux\n${flat(1, ',')}`],
    ['tabs', flat(1, '\t')],
    ['semicolons and comments', `# invented\n# wavelength [nm]; flux\n${flat(1, ';')}`],
  ])('is read with %s', async (_, text) => {
    const { wavelengthsNm, fluxPerNm } = await read(text);
    expect(wavelengthsNm).toEqual(expected);
    expect(fluxPerNm).toEqual(expected.map((_value, index) => index + 1));
  });

  it.each([
    ['wavelength [nm],flux', 1, 'nm'],
    ['wavelength (Å),flux', 10, 'Å'],
    ['lambda_angstrom,flux', 10, 'Å'],
    ['# lambda(A),flux', 10, 'Å'],
    ['wave_um,flux', 0.001, 'µm'],
    ['wave (micron),flux', 0.001, 'µm'],
  ])('under "%s" is in the unit stated, and says so', async (header, perNm, unit) => {
    const { wavelengthsNm, notices } = await read(`${header}\n${flat(perNm, ',')}`);
    wavelengthsNm.forEach((nm, index) => expect(nm).toBeCloseTo(expected[index] ?? 0, 9));
    expect(notices).toEqual([expect.objectContaining({ code: 'wavelengthUnit', severity: 'note' })]);
    expect(notices[0]?.message).toContain(` in ${unit}, as the header says`);
  });

  it.each([
    [0.001, 'µm'],
    [1, 'nm'],
    [10, 'Å'],
  ])('without a word on units is judged by its size, with a warning (%d a nm)', async (perNm, unit) => {
    const { wavelengthsNm, notices } = await read(flat(perNm));
    expect(wavelengthsNm[11]).toBeCloseTo(620, 9);
    expect(notices).toEqual([expect.objectContaining({ code: 'wavelengthUnit', severity: 'warning' })]);
    expect(notices[0]?.message).toContain(` in ${unit}, judging by their size`);
  });

  it('with its unit chosen needs no guess', async () => {
    expect((await read(flat(10), { wavelengthUnit: 'angstrom' })).notices).toEqual([]);
    expect((await read(flat(1, ',', 2000), { wavelengthUnit: 'nm' })).wavelengthsNm[0]).toBe(2000);
  });

  it('is sorted, taken from air to vacuum, and put to rest', async () => {
    const shuffled = flat().split('\n').toReversed().join('\n');
    const { wavelengthsNm, fluxPerNm } = await read(shuffled, { isAirWavelength: true, observedAtRedshift: 1.5 });
    // 500 nm in air is 500.139 nm in vacuum (Ciddor 1996), as seen; divided by 2.5 at rest.
    expect(wavelengthsNm[5]).toBeCloseTo(500.139 / 2.5, 3);
    expect(airFromVacuumNm((wavelengthsNm[5] ?? 0) * 2.5)).toBeCloseTo(500, 9);
    expect(fluxPerNm[0]).toBe(1);
  });

  it('per unit frequency becomes one per unit wavelength: flat in frequency falls as λ⁻²', async () => {
    const text = expected.map((nm) => `${nm} 3`).join('\n');
    const { fluxPerNm } = await read(text, { fluxKind: 'perFrequency', wavelengthUnit: 'nm' });
    expect((fluxPerNm[5] ?? 0) / (fluxPerNm[0] ?? 1)).toBeCloseTo((400 / 500) ** 2, 12);
  });

  it('has negative noise set to 0 and counted', async () => {
    const { fluxPerNm, notices } = await read(flat().replace('\n420 2', '\n420 -2').replace('\n440 3', '\n440 −0.5'), {
      wavelengthUnit: 'nm',
    });
    expect(fluxPerNm.slice(0, 4)).toEqual([1, 0, 0, 4]);
    expect(notices).toEqual([expect.objectContaining({ code: 'negativeFlux', severity: 'warning' })]);
    expect(notices[0]?.message).toMatch(/^2 of 12 /);
  });

  it('is the same read in slices, whatever ends its lines and however it is commented on', async () => {
    const lines = Array.from({ length: 5000 }, (_, index) => `${300 + index / 10},${index % 7}`);
    const plain = await read(lines.join('\n'), { wavelengthUnit: 'nm' });
    expect(plain.wavelengthsNm).toHaveLength(5000);
    expect(plain.wavelengthsNm[4999]).toBeCloseTo(799.9, 9);
    expect(plain.fluxPerNm.slice(1498, 1504)).toEqual([0, 1, 2, 3, 4, 5]);
    const commented = lines.flatMap((line, index) => (index % 10 === 0 ? ['# ten more', '', line] : [line]));
    const again = await read(commented.slice(0, 5900).join('\r\n'), { wavelengthUnit: 'nm' });
    expect(again.wavelengthsNm).toEqual(plain.wavelengthsNm.slice(0, again.wavelengthsNm.length));
    expect(again.fluxPerNm).toEqual(plain.fluxPerNm.slice(0, again.fluxPerNm.length));
  });

  it('gives the same hash to the same points, and another to others', async () => {
    const { contentHash } = await read(flat());
    expect((await read(flat(1, ','))).contentHash).toBe(contentHash);
    expect((await read(flat(1, ' ', 401))).contentHash).not.toBe(contentHash);
  });

  it.each([
    ['', /empty/, {}],
    [flat().replaceAll(/ .*/g, ''), /two columns/, {}],
    [flat().split('\n').slice(0, 9).join('\n'), /at least 10 points; this one has 9/, {}],
    [flat().replace('\n440 3', '\n440 x'), /Row 3: The flux density cannot be read. "x" is not a number/, {}],
    [flat().replace('\n440 3', '\n440 NaN'), /Row 3/, {}],
    [flat().replace('\n440 3', '\n440'), /Row 3: The flux density/, {}],
    [flat().replace('\n440 3', '\n-440 3'), /Row 3: a wavelength is above 0/, {}],
    [flat().replace('\n440 3', '\n420 3'), /Rows 2 and 3 have the same wavelength/, {}],
    [flat(1, ' ', 150), /Row 1: air is not transparent/, { isAirWavelength: true, wavelengthUnit: 'nm' }],
    [flat(0.001), /Is the unit another one/, { wavelengthUnit: 'nm' }],
    [expected.map((nm) => `${nm} -1`).join('\n'), /No flux of this spectrum is above 0/, {}],
    [Array.from({ length: 50_002 }, (_, index) => `${300 + index} 1`).join('\n'), /50000/, {}],
    [`${flat()}\n${'\n'.repeat(52_000)}`, /more than 51000 lines/, {}],
    [
      `${flat()}\n${Array.from({ length: 4000 }, (_, index) => `${1000 + index} ${index === 3000 ? 'x' : 1}`).join('\n')}`,
      /Row 3013: The flux/,
      {},
    ],
    [
      `${flat()}\n${Array.from({ length: 4000 }, (_, index) => `${1000 + index} ${index === 3000 ? '1 '.repeat(300) : 1}`).join('\n')}`,
      /Row 3013 has 301 cells/,
      {},
    ],
  ])('is refused (case %#)', async (text, message, options) => {
    expect(await fault(text, options)).toMatch(message);
  });
});
