import { expect, it } from 'vitest';
import { lightReport } from '../../testing/lightReportExample';
import { decimalsFor, percentText, quantilesText, shownRange, uncertaintySentences } from './uncertainty';

it('shows both peaks of a distribution and little of the nothing around them', () => {
  const [low, high] = shownRange(lightReport.uncertainty!.distribution);
  expect(low).toBeGreaterThan(0.3);
  expect(low).toBeLessThan(1.5);
  expect(high).toBeGreaterThan(7.6);
});

it('survives a distribution that is nowhere', () => {
  expect(shownRange({ redshifts: [1, 2], densities: [0, 0] })).toEqual([1, 2]);
});

it('gives as many decimals as a width is worth', () => {
  expect(decimalsFor({ p16: 6.71, p50: 6.98, p84: 7.24 })).toBe(2);
  expect(decimalsFor({ p16: 900, p50: 970, p84: 1040 })).toBe(0);
  expect(decimalsFor({ p16: 2, p50: 2, p84: 2 })).toBe(3);
  expect(quantilesText({ p16: 6.71, p50: 6.98, p84: 7.24 })).toBe('6.98, between 6.71 and 7.24');
});

it('does not round the not quite certain to certain', () => {
  expect(percentText(0.999)).toBe('> 99 %');
  expect(percentText(0.001)).toBe('< 1 %');
  expect(percentText(1)).toBe('100 %');
  expect(percentText(0)).toBe('0 %');
});

it('says line, magnitude and the draws without light in words', () => {
  const [line, magnitude, dark] = uncertaintySentences(lightReport.uncertainty!, 'J');
  expect(line).toBe(
    '64 % that Lyα falls in J; 52 % that it comes through a window of the atmosphere. It lies at 970, between 937 and 1002 nm.',
  );
  expect(magnitude).toBe('J 25.98, between 25.91 and 26.06 AB.');
  expect(dark).toBe('12 % of the draws have no light in J and are not part of these magnitudes.');
});

it('speaks of no magnitude where no draw has light', () => {
  const sentences = uncertaintySentences(
    { ...lightReport.uncertainty!, magnitudeAb: null, noLightProbability: 1, lines: [] },
    'z',
  );
  expect(sentences).toEqual(['100 % of the draws have no light in z.']);
});

it('leaves many lines to a table', () => {
  const [line] = lightReport.uncertainty!.lines;
  const sentences = uncertaintySentences({ ...lightReport.uncertainty!, lines: [line!, line!, line!] }, 'J');
  expect(sentences.filter((sentence) => sentence.includes('Lyα'))).toEqual([]);
});
