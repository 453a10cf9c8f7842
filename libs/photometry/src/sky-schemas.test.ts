import { describe, expect, it } from 'vitest';
import { referenceContents } from '../../../tests/factories/photometry-files.js';
import { photometryFilesFrom } from './reference-files.js';

const contents = referenceContents();

/** The files with the data of one changed. */
function changed(file: string, change: (data: Record<string, never>) => void): Map<string, unknown> {
  const content = structuredClone(contents.get(file)) as { data: Record<string, never> };
  change(content.data);
  return new Map(contents).set(file, content);
}

interface Points {
  wavelengthsNm: number[];
  magPerAirmass: number[];
}

describe('reference files of the sky', () => {
  it.each<[what: string, file: string, words: string, change: (data: never) => void]>([
    [
      'an extinction too few',
      'extinction-curves.json',
      'each wavelength',
      ({ curves }: { curves: Points[] }) => curves[0]!.magPerAirmass.pop(),
    ],
    [
      'wavelengths out of order',
      'extinction-curves.json',
      'must ascend',
      ({ curves }: { curves: Points[] }) => curves[1]!.wavelengthsNm.reverse(),
    ],
    [
      'a near infrared that begins inside a curve',
      'extinction-curves.json',
      'beyond the end',
      ({ nearInfrared }: { nearInfrared: Points }) => (nearInfrared.wavelengthsNm[0] = 990),
    ],
    ['a curve twice', 'extinction-curves.json', 'twice', ({ curves }: { curves: Points[] }) => curves.push(curves[0]!)],
    [
      'an unknown band of the dark sky',
      'dark-sky.json',
      'bandId',
      ({ sets }: { sets: { rows: { bandId: string }[] }[] }) => (sets[0]!.rows[0]!.bandId = 'Q'),
    ],
    [
      'a colour too few',
      'sunlight.json',
      'each wavelength',
      ({ absoluteMagnitudesAb }: { absoluteMagnitudesAb: number[] }) => absoluteMagnitudesAb.pop(),
    ],
    [
      'a twilight that does not fade',
      'twilight.json',
      'magPerDegree',
      ({ rows }: { rows: { magPerDegree: number }[] }) => (rows[0]!.magPerDegree = 0),
    ],
    [
      'a line of no strength',
      'oh-lines.json',
      'relativeIntensities.0',
      ({ relativeIntensities }: { relativeIntensities: number[] }) => (relativeIntensities[0] = 0),
    ],
  ])('are refused with %s', (_, file, words, change) => {
    const read = () => photometryFilesFrom(changed(file, change as never));
    expect(read).toThrow(`Reference data ${file}: `);
    expect(read).toThrow(words);
  });
});
