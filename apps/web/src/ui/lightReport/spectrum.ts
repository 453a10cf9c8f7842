import type { BandLight, LightSpectrum } from '@faintward/contracts/light-report';
import type { BandId } from '@faintward/contracts/light';
import { spacedTicks } from '../plot/labels';
import { linearTicks } from '../plot/scale';

export type RangeId = 'bands' | 'optical' | 'nearInfrared' | 'all' | 'band';

/** Wavelengths to look at, in nm. `bands` and `all` (bands and windows) go as far as the spectrum says something. */
export function wavelengthRange(
  id: RangeId,
  spectrum: Pick<LightSpectrum, 'validLowNm' | 'validHighNm'>,
  bands: readonly Pick<BandLight, 'bandId' | 'wavelengthLowNm' | 'wavelengthHighNm'>[],
  atmosphere: readonly { lowNm: number; highNm: number }[],
  bandId: BandId | null,
): [number, number] {
  const band = bands.find((one) => one.bandId === bandId);
  if (id === 'band' && band) {
    const width = band.wavelengthHighNm - band.wavelengthLowNm;
    return [Math.max(1, band.wavelengthLowNm - 0.7 * width), band.wavelengthHighNm + 0.7 * width];
  }
  if (id === 'optical') return [300, 1080];
  if (id === 'nearInfrared') return [880, 2500];
  const windows = id === 'bands' && bands.length > 0 ? [] : atmosphere;
  const lows = [...bands.map((one) => one.wavelengthLowNm), ...windows.map((one) => one.lowNm)];
  const highs = [...bands.map((one) => one.wavelengthHighNm * 1.02), ...windows.map((one) => one.highNm)];
  if (lows.length === 0) return [spectrum.validLowNm, spectrum.validHighNm];
  const low = Math.max(spectrum.validLowNm, Math.min(...lows));
  const high = Math.min(spectrum.validHighNm, Math.max(...highs));
  return low < high ? [low, high] : [spectrum.validLowNm, spectrum.validHighNm];
}

/** AB magnitude of a flux density; null without flux, which has no magnitude. */
export function abMagnitude(fluxJy: number): number | null {
  return fluxJy > 0 ? -2.5 * Math.log10(fluxJy / 3631) : null;
}

/**
 * The part of a curve between two wavelengths, with its ends interpolated so that it reaches the edges of the plot. Nothing
 * is made up beyond the first and last wavelength given.
 */
export function clipCurve(
  wavelengthsNm: readonly number[],
  values: readonly number[],
  [low, high]: readonly [number, number],
): { x: number; y: number }[] {
  const points: { x: number; y: number }[] = [];
  const valueAt = (index: number, x: number) => {
    const x0 = wavelengthsNm[index]!;
    const x1 = wavelengthsNm[index + 1]!;
    const share = x1 === x0 ? 0 : (x - x0) / (x1 - x0);
    return values[index]! + share * (values[index + 1]! - values[index]!);
  };
  for (const [index, x] of wavelengthsNm.entries()) {
    const next = wavelengthsNm[index + 1];
    if (x >= low && x <= high) points.push({ x, y: values[index]! });
    if (next === undefined) continue;
    if (x < low && next > low) points.push({ x: low, y: valueAt(index, low) });
    if (x < high && next > high) points.push({ x: high, y: valueAt(index, high) });
  }
  return points;
}

const fluxUnits = [
  { unit: 'Jy', perJy: 1 },
  { unit: 'mJy', perJy: 1e3 },
  { unit: 'µJy', perJy: 1e6 },
  { unit: 'nJy', perJy: 1e9 },
] as const;

/** The unit in which the largest flux is a number of ordinary size; µJy where there is no flux. */
export function fluxUnit(largestJy: number): { unit: string; perJy: number } {
  if (!(largestJy > 0)) return fluxUnits[2];
  return fluxUnits.find(({ perJy }) => largestJy * perJy >= 0.1) ?? fluxUnits[3];
}

/** Most of what an axis of magnitudes shows below the brightest: fainter, and the drawing shows nothing else. */
const depthMag = 5;

/** Faint below, bright above. */
export function magnitudeDomain(magnitudes: readonly (number | null)[]): [number, number] {
  const known = magnitudes.filter((value): value is number => value !== null);
  if (known.length === 0) return [30, 20];
  const bright = Math.min(...known);
  const faint = Math.min(Math.max(...known), bright + depthMag);
  return [Math.max(faint, bright + 1) + 0.3, bright - 0.4];
}

const logTicksNm = [
  100, 150, 200, 300, 400, 500, 600, 800, 1000, 1200, 1500, 2000, 2500, 3000, 4000, 5000, 7000, 10_000, 15_000, 20_000,
  30_000, 50_000, 100_000,
];

/** Round wavelengths inside a range that keep their labels apart. */
export function wavelengthTicks(
  range: readonly [number, number],
  kind: 'log' | 'linear',
  at: (nm: number) => number,
  gap = 36,
): number[] {
  const [low, high] = range;
  const candidates =
    kind === 'log' && high / low > 1.8
      ? logTicksNm.filter((tick) => tick >= low && tick <= high)
      : linearTicks(low, high, Math.max(2, Math.floor(Math.abs(at(high) - at(low)) / (gap * 1.6))));
  return spacedTicks(candidates, at, gap);
}

/** Where two curves differ most, as a share of the larger one; null where they are the same to a hundredth. */
export function largestDifference(
  one: readonly { x: number; y: number }[],
  other: readonly { x: number; y: number }[],
): { x: number; y: number } | null {
  const largest = Math.max(0, ...other.map((point) => point.y));
  let best: { x: number; y: number; by: number } | null = null;
  for (const [index, point] of other.entries()) {
    const by = point.y - (one[index]?.y ?? 0);
    if (by > 0.01 * largest && (!best || by > best.by * 1.001)) best = { ...point, by };
  }
  if (!best) return null;
  // In the middle of the stretch that differs as much, not at its edge.
  const alike = other.filter((point, index) => point.y - (one[index]?.y ?? 0) > 0.9 * best.by);
  return alike[Math.floor(alike.length / 2)] ?? best;
}
