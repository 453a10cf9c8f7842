import { OutOfDomainError } from '../domain.js';
import { type LineId, LYMAN_LIMIT_NM } from '../lines.js';
import { REST_GRID_LOW_NM, isBelow, restGrid, sampleOn } from '../rest-grid.js';
import { formatSlope } from './power-law.js';
import { caution, restLine, type RestLine, type RestSpectrum } from './rest-spectrum.js';
import type { SourceTemplates, SpectralLines } from './templates.js';

/** Young stars with a break and emission lines; see `starFormingSpectrum`. */
export interface StarFormingSource {
  readonly kind: 'starForming';
  /** β of f_λ ∝ λ^β up to the Balmer break. */
  readonly slopeBeta: number;
  /** f_ν at 400 nm over what the power law gives at 364.6 nm: 1 none, 1.1 young, 2 old. */
  readonly breakRatio: number;
  /** Rest equivalent widths. */
  readonly lymanAlphaNm: number;
  /** Both lines of the doublet. */
  readonly oxygenIINm: number;
  /** [O III] 4960 and 5008 with Hβ. */
  readonly oxygenIIIHydrogenBetaNm: number;
  readonly hydrogenAlphaNm: number;
}

const BALMER_BREAK_NM = 364.6;
const BREAK_END_NM = 400;
/** β beyond the break: the middle of −2 … −1.5, common practice for young populations. */
const SLOPE_BEYOND_BREAK = -1.75;
const HIGHEST_NM = 2500;
const REFERENCE_NM = 150;

/**
 * [O II] 3730/3727: the low-density limit, the ratio of the statistical weights of the upper levels (6/4), as in Osterbrock &
 * Ferland 2006 (from memory). At the densities of star-forming galaxies beyond z ≈ 2 it is nearer 1.2.
 */
const OXYGEN_II_RATIO = 1.5;
/** [O III] 5008/4960: Storey & Zeippen 2000, MNRAS 312, 813 (from memory). */
const OXYGEN_III_RATIO = 2.98;
/** [O III] 5008 / Hβ of metal-poor star-forming galaxies: common practice; 2 to 8 occur. */
const OXYGEN_III_OVER_H_BETA = 5;

/**
 * A galaxy of young stars: f_λ ∝ λ^β from the Lyman limit (nothing below it) to 364.6 nm; to 400 nm f_ν rises as the power of λ
 * that ends `breakRatio` above; beyond, f_λ ∝ λ^−1.75. Continuous except at the Lyman limit. Lines by their equivalent widths on
 * this continuum: doublets keep their flux ratio, their common width is against the continuum at the longer line.
 *
 * The steps are described by Bruzual 1983, ApJ 273, 105; the slope beyond and the shape between are common practice, good to
 * about 0.3 mag in a broad band.
 */
export function starFormingSpectrum(
  source: StarFormingSource,
  { lines }: Pick<SourceTemplates, 'lines'>,
  jumpsNm: readonly number[],
): RestSpectrum {
  const { slopeBeta, breakRatio } = source;
  if (!Number.isFinite(slopeBeta)) throw new OutOfDomainError('slopeBeta', slopeBeta, 'a finite number');
  if (!(breakRatio > 0 && breakRatio < Infinity)) throw new OutOfDomainError('breakRatio', breakRatio, 'above 0');
  const value = continuumOf(slopeBeta, breakRatio);
  const grid = restGrid([LYMAN_LIMIT_NM, ...jumpsNm], [BALMER_BREAK_NM, BREAK_END_NM]);
  return {
    label: `star-forming galaxy, β = ${formatSlope(slopeBeta)}, break ${breakRatio}`,
    source: 'two power laws joined at the Balmer and 4000 Å breaks, lines by equivalent width',
    provenance: 'commonPractice',
    continuum: sampleOn(grid, (x, side) => (isBelow(x, LYMAN_LIMIT_NM, side) ? 0 : value(x))),
    lines: linesOf(source, value, lines),
    validLowNm: REST_GRID_LOW_NM,
    validHighNm: HIGHEST_NM,
    cautions: [
      caution(
        'starFormingApproximate',
        'Beyond the break the slope is a common choice, not a measurement: good to about 0.3 mag in a broad band.',
        BALMER_BREAK_NM,
        1000,
      ),
      caution(
        'starFormingNearInfrared',
        'Beyond 1 µm at rest the spectrum depends on the age of the stars; the slope drawn can be off by half a magnitude and more.',
        1000,
        HIGHEST_NM,
      ),
    ],
  };
}

function continuumOf(slopeBeta: number, breakRatio: number): (wavelengthNm: number) => number {
  const atBreak = (BALMER_BREAK_NM / REFERENCE_NM) ** slopeBeta;
  // f_ν ∝ λ² f_λ: a ratio in f_ν is a ratio in f_λ times (364.6 / 400)².
  const afterBreak = atBreak * breakRatio * (BALMER_BREAK_NM / BREAK_END_NM) ** 2;
  const slopeInBreak = Math.log(afterBreak / atBreak) / Math.log(BREAK_END_NM / BALMER_BREAK_NM);
  return (wavelengthNm) => {
    if (wavelengthNm <= BALMER_BREAK_NM) return (wavelengthNm / REFERENCE_NM) ** slopeBeta;
    if (wavelengthNm <= BREAK_END_NM) return atBreak * (wavelengthNm / BALMER_BREAK_NM) ** slopeInBreak;
    return afterBreak * (wavelengthNm / BREAK_END_NM) ** SLOPE_BEYOND_BREAK;
  };
}

function linesOf(
  source: StarFormingSource,
  continuum: (wavelengthNm: number) => number,
  lines: SpectralLines,
): RestLine[] {
  const made: RestLine[] = [];
  const add = (field: string, equivalentWidthNm: number, shares: readonly LineShare[]): void => {
    if (!(equivalentWidthNm >= 0 && equivalentWidthNm < Infinity)) {
      throw new OutOfDomainError(field, equivalentWidthNm, '0 or more');
    }
    if (equivalentWidthNm > 0) made.push(...shareOut(shares, equivalentWidthNm, continuum, lines));
  };
  add('lymanAlphaNm', source.lymanAlphaNm, [['Lya', 1]]);
  add('oxygenIINm', source.oxygenIINm, [
    ['OII_3727', 1],
    ['OII_3729', OXYGEN_II_RATIO],
  ]);
  add('oxygenIIIHydrogenBetaNm', source.oxygenIIIHydrogenBetaNm, [
    ['Hb', 1 / OXYGEN_III_OVER_H_BETA],
    ['OIII_4960', 1 / OXYGEN_III_RATIO],
    ['OIII_5008', 1],
  ]);
  add('hydrogenAlphaNm', source.hydrogenAlphaNm, [['Ha', 1]]);
  return made;
}

type LineShare = readonly [LineId, number];

/** The flux of an equivalent width against the continuum at the last line, shared out in proportion. */
function shareOut(
  shares: readonly LineShare[],
  equivalentWidthNm: number,
  continuum: (wavelengthNm: number) => number,
  lines: SpectralLines,
): RestLine[] {
  const total = shares.reduce((sum, [, share]) => sum + share, 0);
  const flux = equivalentWidthNm * continuum(lines[shares.at(-1)![0]].vacuumWavelengthNm);
  return shares.map(([id, share]) => restLine(lines[id], (flux * share) / total));
}
