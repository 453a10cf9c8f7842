import { Light, type RedshiftUncertainty, type Spectrum, type TargetInput } from '@faintward/contracts';
import type { LightRecipe, RedshiftRecipe, Span, SpectrumRecipe } from './demo-data.js';
import { demoId } from './identifiers.js';
import { type RandomStream, roundTo } from './random.js';

/** Identifier of a spectrum that the team of a demo proposal uploaded. */
export function demoSpectrumId(proposalKey: string, spectrumKey: string): string {
  return demoId('spectrum', proposalKey, spectrumKey);
}

/** A redshift as its investigators know it. */
export function redshiftOf(
  recipe: RedshiftRecipe,
  random: RandomStream,
): Pick<TargetInput, 'redshift' | 'redshiftUncertainty' | 'redshiftKind'> {
  const isPhotometric = recipe.sigma !== undefined;
  const redshift = roundTo(random.between(recipe.low, recipe.high), isPhotometric ? 2 : 4);
  return {
    redshift,
    redshiftUncertainty: uncertaintyOf(recipe, redshift, random),
    redshiftKind: recipe.kind ?? (isPhotometric ? 'photometric' : 'spectroscopic'),
  };
}

function uncertaintyOf(recipe: RedshiftRecipe, redshift: number, random: RandomStream): RedshiftUncertainty | null {
  if (recipe.sigma === undefined) return random.next() < 0.7 ? { kind: 'gaussian', sigma: 0.0003 } : null;
  const sigma = roundTo(recipe.sigma * random.between(0.7, 1.4), 2);
  if (recipe.interloper !== undefined) {
    const share = random.between(...recipe.interloper.share);
    return twoPeaks({ redshift, sigma }, recipe.interloper, share);
  }
  if (recipe.isSkewed !== true) return { kind: 'gaussian', sigma };
  const above = roundTo(sigma * random.between(1.1, 1.6), 2);
  return {
    kind: 'percentiles',
    p16: roundTo(redshift - sigma, 2),
    p50: redshift,
    p84: roundTo(redshift + above, 2),
  };
}

interface Solution {
  redshift: number;
  sigma: number;
}

/** A distribution of two solutions, as a table of the kind that a fit writes. */
function twoPeaks(main: Solution, other: Solution, otherShare: number): RedshiftUncertainty {
  const at = ({ redshift, sigma }: Solution, z: number) =>
    Math.exp(-0.5 * ((z - redshift) / sigma) ** 2) / (sigma * Math.sqrt(2 * Math.PI));
  const redshifts = [other, main]
    .toSorted((a, b) => a.redshift - b.redshift)
    .flatMap(({ redshift, sigma }) =>
      Array.from({ length: 41 }, (_, step) => roundTo(redshift + ((step - 20) / 5) * sigma, 3)),
    );
  return {
    kind: 'table',
    redshifts,
    densities: redshifts.map((z) => roundTo((1 - otherShare) * at(main, z) + otherShare * at(other, z), 5)),
  };
}

/** The light of one target of a group. */
export function lightOf(recipe: LightRecipe, proposalKey: string, random: RandomStream): Light {
  return Light.parse({ ...amountOf(recipe, proposalKey, random), ...wayOf(recipe, random) });
}

function amountOf(recipe: LightRecipe, proposalKey: string, random: RandomStream): object {
  switch (recipe.kind) {
    case 'apparentMagnitude':
      return {
        kind: recipe.kind,
        magnitude: roundTo(random.between(...recipe.magnitude), 2),
        bandId: recipe.bandId,
        spectrum: spectrumOf(recipe.spectrum, proposalKey, random),
        sigmaMag: roundTo(random.between(0.03, 0.15), 2),
      };
    case 'absoluteMagnitude':
      return {
        kind: recipe.kind,
        magnitude: roundTo(random.between(...recipe.magnitude), 2),
        spectrum: spectrumOf(recipe.spectrum, proposalKey, random),
        sigmaMag: roundTo(random.between(0.05, 0.2), 2),
      };
    case 'lineFlux': {
      const [lowFlux, highFlux] = recipe.fluxErgSCm2;
      return {
        kind: recipe.kind,
        // Evenly in the logarithm, as faint lines outnumber bright ones.
        fluxErgSCm2: Number((lowFlux * (highFlux / lowFlux) ** random.next()).toPrecision(3)),
        restWavelengthNm: recipe.restWavelengthNm,
        velocityWidthKmS: Math.round(random.between(...recipe.velocityWidthKmS) / 5) * 5,
        sigmaMag: roundTo(random.between(0.05, 0.2), 2),
      };
    }
    case 'typical':
      return { kind: recipe.kind, of: recipe.of, spectrum: spectrumOf(recipe.spectrum, proposalKey, random) };
  }
}

function spectrumOf(recipe: SpectrumRecipe, proposalKey: string, random: RandomStream): Partial<Spectrum> {
  const drawn = (span: Span, decimals: number) => roundTo(random.between(...span), decimals);
  switch (recipe.kind) {
    case 'powerLaw':
      return { kind: 'powerLaw', slopeBeta: drawn(recipe.slopeBeta, 2) };
    case 'starForming':
      return { kind: 'starForming', slopeBeta: drawn(recipe.slopeBeta, 2), breakRatio: drawn(recipe.breakRatio, 2) };
    case 'passive':
      return { kind: 'passive' };
    case 'quasar':
      return { kind: 'quasar', template: recipe.template };
    case 'supernovaIa':
      return { kind: 'supernovaIa', phaseDays: drawn(recipe.phaseDays, 0) };
    case 'blackbody':
      return { kind: 'blackbody', temperatureK: drawn(recipe.temperatureK, 0) };
    case 'uploaded':
      return { kind: 'uploaded', spectrumId: demoSpectrumId(proposalKey, recipe.spectrum) };
  }
}

function wayOf(recipe: LightRecipe, random: RandomStream): object {
  const { hostDust, galacticDust, magnification, sigmaLnMagnification } = recipe;
  return {
    ...(hostDust === undefined ? {} : { hostDust: { colourExcessMag: roundTo(random.between(...hostDust), 2) } }),
    ...(galacticDust === undefined
      ? {}
      : { galacticDust: { colourExcessMag: roundTo(random.between(...galacticDust), 3) } }),
    ...(magnification === undefined ? {} : { magnification: roundTo(random.between(...magnification), 1) }),
    ...(sigmaLnMagnification === undefined ? {} : { sigmaLnMagnification }),
  };
}
