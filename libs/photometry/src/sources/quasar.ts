import { LYMAN_LIMIT_NM, type LineId } from '../lines.js';
import { SPEED_OF_LIGHT_KM_S } from '../constants.js';
import { restGrid, sampleOn } from '../rest-grid.js';
import { firstAbove, type SampledCurve } from '../sampled-curve.js';
import { gaussianSigmaFromFwhm } from '../wavelengths.js';
import { binMeans } from './rebin.js';
import { caution, type RestSpectrum, type SpectrumCaution } from './rest-spectrum.js';
import type { SourceTemplates, SpectralLines } from './templates.js';

/** A quasar, by formula or by a composite spectrum. */
export interface QuasarSource {
  readonly kind: 'quasar';
  readonly template: 'powerLaws' | 'hewettWild2010';
}

/** α of f_ν ∝ ν^α: Vanden Berk et al. 2001, AJ 122, 549 (digits from memory). */
const ALPHA = { ultraviolet: -0.44, optical: -2.45 };
const BREAK_NM = 500;
/** Below the Lyman limit: Lusso et al. 2015, MNRAS 449, 4204 (from memory). */
const ALPHA_IONISING = -1.7;
/** Where the slopes were measured. */
const MEASURED = { lowNm: 130, highNm: 855 };
const LOWEST_NM = 60;
const HIGHEST_NM = 1100;

/** Rest equivalent widths in nm: Vanden Berk et al. 2001, Table 2, rounded (from memory). */
const BROAD_LINES: readonly { readonly id: LineId; readonly equivalentWidthNm: number }[] = [
  { id: 'Lya', equivalentWidthNm: 9.3 },
  { id: 'CIV_1548', equivalentWidthNm: 2.4 },
  { id: 'CIII_1908', equivalentWidthNm: 2.1 },
  { id: 'MgII_2796', equivalentWidthNm: 3.2 },
  { id: 'Hb', equivalentWidthNm: 4.6 },
  { id: 'Ha', equivalentWidthNm: 19.5 },
];
/** FWHM of every line: common practice. */
const BROAD_LINE_WIDTH_KM_S = 5000;

const LINES_FROM_MEMORY = caution(
  'quasarLinesApproximate',
  'Broad lines have the equivalent widths of a published composite, quoted from memory; single quasars differ by factors.',
);
const BLUEWARD = caution(
  'quasarContinued',
  'Below 127.5 nm at rest the spectrum is continued by its power law, with Lyα and N V as one broad line.',
  LOWEST_NM,
  127.526,
);
const REDWARD = caution(
  'quasarHostLight',
  'Beyond 500 nm at rest the slope contains light of host galaxies; a luminous quasar is bluer.',
  BREAK_NM,
  HIGHEST_NM,
);

type Templates = Pick<SourceTemplates, 'quasarHewettWild2010' | 'lines'>;

/** The spectrum of a quasar: two power laws with broad lines, or a published composite continued by them. */
export function quasarSpectrum(
  { template }: QuasarSource,
  templates: Templates,
  jumpsNm: readonly number[],
): RestSpectrum {
  return template === 'powerLaws' ? powerLawQuasar(templates.lines, jumpsNm) : composite(templates, jumpsNm);
}

/**
 * f_ν ∝ ν^−0.44 to 500 nm, ν^−2.45 beyond, ν^−1.7 below the Lyman limit, and broad lines (Lyα with N V, C IV, C III], Mg II, Hβ, Hα)
 * as Gaussians of 5000 km/s.
 */
function powerLawQuasar(lines: SpectralLines, jumpsNm: readonly number[]): RestSpectrum {
  const broad = linesOverContinuum(BROAD_LINES, lines);
  const grid = restGrid(jumpsNm, [LYMAN_LIMIT_NM, BREAK_NM, HIGHEST_NM]);
  return quasar(
    sampleOn(grid, (x) => continuumValue(x) * (1 + broad(x))),
    'quasar, two power laws with broad lines',
    'Vanden Berk et al. 2001, AJ 122, 549 (slopes and equivalent widths from memory)',
    'publishedFromMemory',
    HIGHEST_NM,
    [
      LINES_FROM_MEMORY,
      caution(
        'quasarContinued',
        'Below 130 nm at rest the power law is continued beyond where it was measured.',
        LOWEST_NM,
        MEASURED.lowNm,
      ),
      REDWARD,
      caution(
        'quasarBeyondMeasured',
        'Beyond 855 nm at rest the power law is continued beyond where it was measured.',
        MEASURED.highNm,
        HIGHEST_NM,
      ),
    ],
  );
}

/** Up to here the blue end of the composite is free of lines. */
const ANCHOR_END_NM = 129;

/**
 * The composite, as means over bins around the nodes of the common grid, which conserves its flux. Blueward of its first point
 * the power law and the Lyα of {@link powerLawQuasar}, scaled to its mean up to 129 nm; it ends with its last point.
 */
function composite({ quasarHewettWild2010, lines }: Templates, jumpsNm: readonly number[]): RestSpectrum {
  const { curve, source, provenance } = quasarHewettWild2010;
  const low = curve.wavelengthsNm[0]!;
  const high = curve.wavelengthsNm.at(-1)!;
  const anchor = scaleOf(curve, ANCHOR_END_NM);
  const grid = restGrid([low, high, ...jumpsNm], [LYMAN_LIMIT_NM]);
  const inside = grid.filter((x) => x >= low && x <= high);
  const means = binMeans(curve, inside);
  const firstInside = firstAbove(grid, low) - 2;
  const lymanAlpha = linesOverContinuum(
    BROAD_LINES.filter(({ id }) => id === 'Lya'),
    lines,
  );
  const continuum = sampleOn(grid, (x) => anchor * continuumValue(x) * (1 + lymanAlpha(x)));
  for (let i = 0; i < grid.length; i++) {
    // The first of the two nodes at the lower end belongs to the power law, the second of those at the upper end to nothing.
    if (i > firstInside && i <= firstInside + inside.length - 2) continuum.values[i] = means[i - firstInside]!;
    else if (i > firstInside) continuum.values[i] = 0;
  }
  return quasar(continuum, 'quasar, composite of Hewett & Wild 2010', source, provenance, high, [
    BLUEWARD,
    { ...REDWARD, appliesNm: { lowNm: BREAK_NM, highNm: high } },
  ]);
}

/** Mean of the composite over mean of the power law, from its first point to a wavelength. */
function scaleOf({ wavelengthsNm, values }: SampledCurve, endNm: number): number {
  let [own, power] = [0, 0];
  for (let i = 0; wavelengthsNm[i]! <= endNm; i++) {
    own += values[i]!;
    power += continuumValue(wavelengthsNm[i]!);
  }
  return own / power;
}

function quasar(
  continuum: SampledCurve,
  label: string,
  source: string,
  provenance: RestSpectrum['provenance'],
  validHighNm: number,
  cautions: readonly SpectrumCaution[],
): RestSpectrum {
  return { label, source, provenance, continuum, lines: [], validLowNm: LOWEST_NM, validHighNm, cautions };
}

/** f_λ, 1 at 500 nm: f_ν ∝ ν^α is f_λ ∝ λ^(−2−α). */
function continuumValue(wavelengthNm: number): number {
  if (wavelengthNm > BREAK_NM) return (wavelengthNm / BREAK_NM) ** (-2 - ALPHA.optical);
  if (wavelengthNm >= LYMAN_LIMIT_NM) return (wavelengthNm / BREAK_NM) ** (-2 - ALPHA.ultraviolet);
  return (
    (LYMAN_LIMIT_NM / BREAK_NM) ** (-2 - ALPHA.ultraviolet) * (wavelengthNm / LYMAN_LIMIT_NM) ** (-2 - ALPHA_IONISING)
  );
}

/** Lines over the continuum: W times a Gaussian of unit area, times the continuum at the line over that at the wavelength. */
function linesOverContinuum(broad: typeof BROAD_LINES, lines: SpectralLines): (wavelengthNm: number) => number {
  const gaussians = broad.map(({ id, equivalentWidthNm }) => {
    const centre = lines[id].vacuumWavelengthNm;
    const sigma = (gaussianSigmaFromFwhm(BROAD_LINE_WIDTH_KM_S) / SPEED_OF_LIGHT_KM_S) * centre;
    return { centre, sigma, peak: (equivalentWidthNm * continuumValue(centre)) / (sigma * Math.sqrt(2 * Math.PI)) };
  });
  return (wavelengthNm) => {
    let sum = 0;
    for (const { centre, sigma, peak } of gaussians) {
      const distance = (wavelengthNm - centre) / sigma;
      if (Math.abs(distance) <= 8) sum += peak * Math.exp(-0.5 * distance * distance);
    }
    return sum / continuumValue(wavelengthNm);
  };
}
