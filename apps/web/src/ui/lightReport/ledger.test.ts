import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { estimateSteps, ledgerSteps, lightReport } from '../../testing/lightReportExample';
import { brokenAxis, inputText, inputWords, ledgerLayout, ledgerRows, ledgerSentence } from './ledger';

describe('the broken axis', () => {
  it('breaks once at the distance modulus, and leaves most of the width to the small steps', () => {
    const axis = brokenAxis([-21, 28.24, 25.98, 26.0], 0, 400);
    expect(axis.pieces).toHaveLength(2);
    expect(axis.breaks).toHaveLength(1);
    expect(axis.at(-21)).toBeLessThan(axis.breaks[0]!);
    // 0.02 mag of a spread of 2.26 mag is a whole pixel and more.
    expect(axis.at(26.0) - axis.at(25.98)).toBeGreaterThan(1.5);
  });

  it('breaks twice where electrons are counted: luminosity, rate and magnitudes stand apart', () => {
    const axis = brokenAxis(
      estimateSteps.map((step) => step.totalMag),
      0,
      400,
    );
    expect(axis.pieces.map((piece) => Math.round((piece.lowMag + piece.highMag) / 2))).toEqual([-21, -1, 27]);
  });

  it('does not break without a long step', () => {
    expect(brokenAxis([24, 24.2, 25.5], 0, 300).breaks).toEqual([]);
  });

  it('survives one value and none', () => {
    expect(brokenAxis([24], 10, 110).at(24)).toBeCloseTo(60);
    expect(brokenAxis([], 10, 110).at(3)).toBe(10);
  });

  it('keeps the order of magnitudes and stays inside, whatever the totals are', () => {
    const totals = fc.array(fc.double({ min: -40, max: 60, noNaN: true }), { minLength: 2, maxLength: 12 });
    fc.assert(
      fc.property(totals, (values) => {
        const axis = brokenAxis(values, 20, 620);
        const places = values.toSorted((a, b) => a - b).map((value) => axis.at(value));
        // Half a pixel for rounding where two totals are all but equal.
        return places.every(
          (place, index) => place >= 19.5 && place <= 620.5 && (index === 0 || place >= places[index - 1]! - 1e-6),
        );
      }),
    );
  });
});

describe('the layout', () => {
  const rows = ledgerRows(ledgerSteps, lightReport.ledger!.aperture);

  it('adds the aperture after the sum, as the difference it makes', () => {
    const aperture = rows.at(-1)!;
    expect(aperture.kind).toBe('aperture');
    // 71.54 % of the light: 2.5 log10(1/0.7154) = 0.3636 mag.
    expect(aperture.deltaMag).toBeCloseTo(0.3636, 3);
  });

  it.each([390 - 32, 560, 1100])('keeps rows apart and bars inside at %i px', (width) => {
    const layout = ledgerLayout(rows, width);
    for (const [index, placed] of layout.rows.entries()) {
      const previous = layout.rows[index - 1];
      if (previous) expect(placed.top).toBeGreaterThanOrEqual(previous.top + previous.height);
      expect(placed.barTop + placed.barHeight).toBeLessThanOrEqual(placed.top + placed.height);
      for (const mag of [placed.row.fromMag, placed.row.totalMag]) {
        expect(layout.axis.at(mag)).toBeGreaterThanOrEqual(layout.plotLeft - 0.5);
        expect(layout.axis.at(mag)).toBeLessThanOrEqual(layout.plotRight + 0.5);
      }
    }
    expect(layout.isNarrow).toBe(width < 560);
    expect(layout.height).toBeGreaterThan(layout.rows.at(-1)!.top);
  });

  it.each([358, 800])('gives a title of two lines another line at %i px, a short one none', (width) => {
    const [short, long] = ['Milky Way dust', 'Spectrum between the light as quoted and the range looked at'].map(
      (title) => ledgerLayout(ledgerRows([{ ...ledgerSteps[0]!, title }]), width).rows[0]!,
    );
    // A line of 13 px letters at a line height of 1.15.
    expect(long!.height - short!.height).toBeGreaterThanOrEqual(15);
    expect(long!.barTop + long!.barHeight).toBeLessThanOrEqual(long!.top + long!.height);
  });

  it('groups rows by stage, in order and without gaps', () => {
    const { stages } = ledgerLayout(ledgerRows(estimateSteps), 800);
    expect(stages.map((stage) => stage.stage)).toEqual(['source', 'space', 'atmosphere', 'instrument', 'counting']);
    stages.slice(1).forEach((stage, index) => expect(stage.top).toBe(stages[index]!.bottom));
  });
});

it('says the ledger in a sentence, with its end and the reason for it', () => {
  expect(ledgerSentence(ledgerRows(ledgerSteps), 'Light budget in J')).toBe(
    'Light budget in J: Absolute magnitude as given, −21.00, then 4 steps to a total of 25.98; the largest is Distance modulus, +49.24 mag',
  );
  expect(ledgerSentence(ledgerRows(ledgerSteps.slice(0, 2)), 'Light budget in z', 'no light.')).toContain(
    'It stops there: no light.',
  );
});

it('says inputs in words, without repeating their unit', () => {
  expect(inputWords('luminosityDistanceMpc', 'Mpc')).toBe('luminosity distance');
  expect(inputWords('absoluteMagnitude', 'mag')).toBe('absolute magnitude');
  expect(inputWords('seeing, FWHM', '″')).toBe('seeing, FWHM');
  expect(inputWords('redshift', '')).toBe('redshift');
});

it('writes inputs in words with value and unit', () => {
  expect(inputText({ name: 'luminosityDistanceMpc', value: 47000, unit: 'Mpc' })).toBe('luminosity distance 47000 Mpc');
  expect(inputText({ name: 'redshift', value: 6.1, unit: '' })).toBe('redshift 6.1');
});
