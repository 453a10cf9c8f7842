import type { Light } from '@faintward/contracts/light';
import type { LightUncertainty, Quantiles } from '@faintward/contracts/light-report';
import {
  atmosphericRangeAt,
  quantileOf,
  redshiftDistribution,
  type Response,
  sampleLight,
  type LightSampling,
} from '@faintward/photometry';
import type { LightSetting } from './light.js';
import { resolveLight } from './resolve-light.js';
import { mapInSlices } from './slices.js';
import { lightData } from './light-data.js';
import type { ReportInputs } from './light-report.js';

/** Lines that are usually looked for, where the light itself is not a line. */
const USUAL_LINES = ['Lya', 'CIV_1548', 'MgII_2796', 'OII_3729', 'Hb', 'OIII_5008', 'Ha'];
const CURVE_POINTS = 240;
const HISTOGRAM_BINS = 30;
const SAME_LINE = 1e-4;

/** Draws that are spread evenly together: what half a slice of time suffices for. */
const BATCH_DRAWS = 250;
/** Keeps the numbers of batches apart from those of neighbouring seeds. */
const SEED_STEP = 1_000_003;

/** What redshift and brightness leave open, by draws; null where both are certain. */
export async function uncertaintyOf(
  inputs: ReportInputs,
  light: Light,
  setting: LightSetting,
  response: Response,
): Promise<LightUncertainty | null> {
  const { redshift, redshiftUncertainty, extent, sampleCount, seed } = inputs;
  const sigmaMag = light.sigmaMag ?? 0;
  const sigmaLnMagnification = light.sigmaLnMagnification ?? 0;
  if (redshiftUncertainty === null && sigmaMag === 0 && sigmaLnMagnification === 0) return null;
  const distribution = redshiftDistribution(redshift, redshiftUncertainty);
  const samples = await sampleInBatches({
    lightAt: (drawn) => resolveLight(light, { ...setting, redshift: drawn }),
    redshifts: distribution,
    sigmaMag,
    sigmaLnMagnification,
    distances: setting.cosmology.distances,
    isSurface: extent.kind === 'uniform',
    response,
    sampleCount,
    seed,
  });
  const { magnitudesAb } = samples;
  const curve = distribution.curve(CURVE_POINTS);
  return {
    seed,
    sampleCount,
    redshift: quantilesBy((p) => distribution.quantile(p)),
    magnitudeAb: quantilesOf(magnitudesAb),
    noLightProbability: magnitudesAb.filter(Number.isNaN).length / sampleCount,
    probabilityError: 0.5 / Math.sqrt(sampleCount),
    luminosityDistanceMpc: quantilesBy((p) =>
      setting.cosmology.distances.luminosityDistanceMpc(distribution.quantile(p)),
    ),
    // The scale has a maximum: its quantiles are not those of the redshift.
    kpcPerArcsec: scaleQuantiles(samples.redshifts, setting),
    lines: linesOf(light, setting).map(({ lineId, label, restNm }) => {
      const observed = samples.redshifts.map((drawn) => restNm * (1 + drawn));
      return {
        lineId,
        label,
        observedWavelengthNm: quantilesBy((p) => restNm * (1 + distribution.quantile(p))),
        insideBandProbability: shareOf(observed, (nm) => nm >= response.passLowNm && nm <= response.passHighNm),
        insideWindowProbability: shareOf(
          observed,
          (nm) => atmosphericRangeAt(lightData().atmosphere, nm)?.kind === 'window',
        ),
      };
    }),
    distribution: {
      redshifts: [...curve.redshifts],
      densities: [...curve.densities],
      peaks: distribution.peaks.map(({ redshift: at, probability }) => ({ redshift: at, probability })),
    },
    magnitudeHistogram: histogramOf(magnitudesAb),
  };
}

/** Draws in batches, each spread evenly over the distributions, with turns for others in between. What is too faint for a number is dark. */
async function sampleInBatches(
  sampling: LightSampling,
): Promise<{ redshifts: Float64Array; magnitudesAb: Float64Array }> {
  const { sampleCount, seed } = sampling;
  const redshifts = new Float64Array(sampleCount);
  const magnitudesAb = new Float64Array(sampleCount);
  const starts = Array.from({ length: Math.ceil(sampleCount / BATCH_DRAWS) }, (_, batch) => batch * BATCH_DRAWS);
  await mapInSlices(starts, (start, batch) => {
    const size = Math.min(BATCH_DRAWS, sampleCount - start);
    const drawn = sampleLight({ ...sampling, sampleCount: size, seed: seed + batch * SEED_STEP });
    redshifts.set(drawn.redshifts, start);
    magnitudesAb.set(
      drawn.magnitudesAb.map((magnitude) => (Number.isFinite(magnitude) ? magnitude : NaN)),
      start,
    );
  });
  return { redshifts, magnitudesAb };
}

function linesOf(light: Light, setting: LightSetting): { lineId: string; label: string; restNm: number }[] {
  const { lines } = lightData();
  const resolved = resolveLight(light, setting);
  if (resolved.kind === 'line') {
    const { restWavelengthNm: restNm } = resolved;
    const known = lines.find(({ vacuumWavelengthNm }) => Math.abs(vacuumWavelengthNm / restNm - 1) < SAME_LINE);
    return [{ lineId: known?.id ?? 'line', label: known?.label ?? `line at ${restNm} nm`, restNm }];
  }
  return lines
    .filter(({ id }) => USUAL_LINES.includes(id))
    .map(({ id, label, vacuumWavelengthNm }) => ({ lineId: id, label, restNm: vacuumWavelengthNm }));
}

function quantilesBy(quantile: (p: number) => number): Quantiles {
  return { p16: quantile(0.16), p50: quantile(0.5), p84: quantile(0.84) };
}

function quantilesOf(values: Float64Array): Quantiles | null {
  const [p16, p50, p84] = [0.16, 0.5, 0.84].map((p) => quantileOf(values, p));
  return p16 === undefined || p50 === undefined || p84 === undefined ? null : { p16, p50, p84 };
}

const KPC_PER_MPC_ARCSEC = (1000 * Math.PI) / 648_000;

function scaleQuantiles(redshifts: Float64Array, { cosmology }: LightSetting): Quantiles | null {
  return quantilesOf(
    redshifts.map(
      (redshift) => (cosmology.distances.luminosityDistanceMpc(redshift) / (1 + redshift) ** 2) * KPC_PER_MPC_ARCSEC,
    ),
  );
}

function shareOf(values: Float64Array, holds: (value: number) => boolean): number {
  return values.filter(holds).length / values.length;
}

/** Even bins over all draws but the outermost thousandth to either side, which the end bins take in. */
function histogramOf(values: Float64Array): LightUncertainty['magnitudeHistogram'] {
  const low = quantileOf(values, 0.001);
  const high = quantileOf(values, 0.999);
  if (low === undefined || high === undefined || !(high > low)) return { edges: [], counts: [] };
  const width = (high - low) / HISTOGRAM_BINS;
  const counts = new Array<number>(HISTOGRAM_BINS).fill(0);
  for (const value of values) {
    if (Number.isNaN(value)) continue;
    const bin = Math.min(Math.max(Math.floor((value - low) / width), 0), HISTOGRAM_BINS - 1);
    counts[bin]! += 1;
  }
  return { edges: Array.from({ length: HISTOGRAM_BINS + 1 }, (_, i) => low + i * width), counts };
}
