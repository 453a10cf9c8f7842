import type { LightUncertainty, Quantiles } from '@faintward/contracts/light-report';
import { formatNumber } from '../../lib/format';

type Distribution = LightUncertainty['distribution'];

/**
 * The part of a distribution that is worth looking at: where it reaches a thousandth of its peak, with a margin. Between
 * two peaks nothing is left out.
 */
export function shownRange({ redshifts, densities }: Pick<Distribution, 'redshifts' | 'densities'>): [number, number] {
  const peak = densities.reduce((largest, density) => Math.max(largest, density), 0);
  const first = densities.findIndex((density) => density > peak / 1000);
  const last = densities.findLastIndex((density) => density > peak / 1000);
  const low = redshifts[first];
  const high = redshifts[last];
  if (low === undefined || high === undefined) return [redshifts[0] ?? 0, redshifts.at(-1) ?? 1];
  const margin = 0.08 * (high - low || 0.1);
  return [Math.max(0, low - margin), high + margin];
}

/** Enough decimals that a number tells the width of its distribution. */
export function decimalsFor({ p16, p84 }: Quantiles): number {
  const spread = p84 - p16;
  return spread > 0 ? Math.min(5, Math.max(0, 1 - Math.floor(Math.log10(spread)))) : 3;
}

/** "6.98, between 6.71 and 7.24". */
export function quantilesText(quantiles: Quantiles, decimals = decimalsFor(quantiles)): string {
  const text = (value: number) => formatNumber(value, { decimals });
  return `${text(quantiles.p50)}, between ${text(quantiles.p16)} and ${text(quantiles.p84)}`;
}

/** A probability in whole per cent; what is not quite certain or impossible is not rounded to it. */
export function percentText(probability: number): string {
  if (probability > 0 && probability < 0.005) return '< 1 %';
  if (probability < 1 && probability > 0.995) return '> 99 %';
  return `${formatNumber(100 * probability, { decimals: 0 })} %`;
}

/** More lines than this are a table. */
export const mostLinesInWords = 2;

/** What the draws say, sentence by sentence. `bandLabel` is that of the ledger. */
export function uncertaintySentences(uncertainty: LightUncertainty, bandLabel: string | null): string[] {
  const sentences: string[] = [];
  for (const line of uncertainty.lines.length > mostLinesInWords ? [] : uncertainty.lines) {
    const at = quantilesText(line.observedWavelengthNm, Math.min(1, decimalsFor(line.observedWavelengthNm)));
    const inBand = bandLabel
      ? `${percentText(line.insideBandProbability)} that ${line.label} falls in ${bandLabel}; `
      : '';
    sentences.push(
      `${inBand}${percentText(line.insideWindowProbability)} that ${bandLabel ? 'it' : line.label} comes through a window of the atmosphere. It lies at ${at} nm.`,
    );
  }
  if (uncertainty.magnitudeAb) {
    sentences.push(`${bandLabel ?? 'Magnitude'} ${quantilesText(uncertainty.magnitudeAb, 2)} AB.`);
  }
  if (uncertainty.noLightProbability > 0) {
    sentences.push(
      `${percentText(uncertainty.noLightProbability)} of the draws have no light ${bandLabel ? `in ${bandLabel}` : 'there'}${
        uncertainty.magnitudeAb ? ' and are not part of these magnitudes' : ''
      }.`,
    );
  }
  return sentences;
}
