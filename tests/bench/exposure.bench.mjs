/*
 * Estimates per second over a mixed list of 5,000 observations, as a ratio to evaluating the bare CCD equation for the
 * same observations in the same run.
 *
 *   npx tsc -b libs/exposure/tsconfig.build.json && node tests/bench/exposure.bench.mjs
 */
import { pathToFileURL } from 'node:url';
import { createCosmology } from '@faintward/cosmology';
import { estimate, openShutterSecondsFor, tabulatedDistances } from '@faintward/exposure';
import { aSpectroscopyMode, anImagingMode, anInput } from '@faintward/exposure/testing';

const COUNT = 5000;
const REPEATS = 5;

/** Points, small galaxies and lines in a slit by turns, at z = 0.5 to 5 in steps that never repeat. */
function observations(cosmology, kind) {
  const imaging = anImagingMode({ wavelengthLowNm: 800, wavelengthHighNm: 950 });
  const spectroscopy = aSpectroscopyMode();
  return Array.from({ length: COUNT }, (_, i) => {
    const place = (i * 0.6180339887498949) % 1;
    const redshift = 0.5 + 4.5 * place;
    const absolute = {
      kind: 'absoluteMagnitude',
      absoluteMagnitudeAb: -23 + place,
      restWavelengthNm: 150,
      slopeBeta: -2.1,
    };
    const which = kind === 'mixed' ? ['point', 'galaxy', 'line'][i % 3] : kind;
    if (which === 'line') {
      const light = {
        kind: 'lineLuminosity',
        lineLuminosityErgS: 1e43,
        restWavelengthNm: 800 / (1 + redshift),
        intrinsicWidthKmS: 250,
      };
      return anInput({
        cosmology,
        target: { redshift, light, extent: { kind: 'point' } },
        mode: spectroscopy,
        goal: { kind: 'lineSignificance', sigma: 5 },
      });
    }
    const extent =
      which === 'galaxy'
        ? { kind: 'sersic', halfLightRadiusKpc: 1 + 3 * place, index: [1, 1.5, 2.5, 4][i % 4] }
        : { kind: 'point' };
    return anInput({ cosmology, target: { redshift, light: absolute, extent }, mode: imaging });
  });
}

/** Shortest of several runs, in nanoseconds per observation: what the machine can do when nobody interrupts. */
function shortest(work) {
  let best = Infinity;
  for (let i = 0; i < REPEATS; i++) {
    const start = process.hrtime.bigint();
    work();
    best = Math.min(best, Number(process.hrtime.bigint() - start) / COUNT);
  }
  return best;
}

export async function run() {
  const cosmology = tabulatedDistances(createCosmology('planck18'));
  const figures = {};
  console.log(
    `Estimates, ${COUNT.toLocaleString('en')} observations, planck18 from its table, each with its light budget`,
  );
  for (const kind of ['point', 'galaxy', 'line', 'mixed']) {
    const inputs = observations(cosmology, kind);
    const feasible = inputs.filter((input) => estimate(input).outcome === 'feasible').length;
    const ns = shortest(() => {
      for (const input of inputs) estimate(input);
    });
    figures[kind] = { ns, perSecond: 1e9 / ns, feasible };
    console.log(
      `  ${kind.padEnd(8)} ${(ns / 1000).toFixed(1).padStart(6)} µs each, ${Math.round(1e9 / ns).toLocaleString('en')} a second (${feasible} feasible)`,
    );
  }

  const budgets = observations(cosmology, 'mixed')
    .map((input) => estimate(input))
    .filter((answer) => answer.outcome === 'feasible')
    .map(({ rates, aperture }) => ({
      sourceElectronsPerSecond: rates.sourceElectronsPerSecond,
      backgroundElectronsPerSecondPerPixel: rates.skyElectronsPerSecondPerPixel + 0.002,
      readVarianceElectrons2: 16,
      effectivePixelCount: aperture.pixelCount,
    }));
  let sum = 0;
  const rounds = 200;
  const bareNs =
    (shortest(() => {
      for (let round = 0; round < rounds; round++)
        for (const budget of budgets) sum += openShutterSecondsFor(budget, 10, 1);
    }) *
      COUNT) /
    (rounds * budgets.length);
  if (!(sum > 0)) throw new Error('the bare CCD equation was not evaluated');
  const ratio = figures.mixed.ns / bareNs;
  console.log(`  bare CCD equation: ${bareNs.toFixed(1)} ns; a whole estimate costs ${ratio.toFixed(0)} of them`);
  console.log(`  all ${COUNT.toLocaleString('en')} mixed: ${((figures.mixed.ns * COUNT) / 1e6).toFixed(0)} ms`);
  return { ...figures, bareNs, ratio };
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) await run();
