/*
 * Luminosity distances in bulk: how long one takes, against direct quadrature in the same run and, where a python3 with
 * astropy is installed, against its vectorised call; and the largest error seen.
 *
 *   npx tsc -b libs/cosmology/tsconfig.build.json && node tests/bench/cosmology.bench.mjs
 */
import { spawnSync } from 'node:child_process';
import { pathToFileURL } from 'node:url';
import { createCosmology, distanceRows, luminosityDistancesMpc } from '@faintward/cosmology';

const COUNT = 1_000_000;
const DIRECT_COUNT = 20_000;
const ROW_COUNT = 100_000;
const REPEATS = 25;

/** Redshifts 1e-4 to 20, even in the logarithm and shuffled by a multiplicative step, so that neighbours share no cell. */
function redshiftsFor(count) {
  const span = Math.log(20 / 1e-4);
  return Float64Array.from({ length: count }, (_, i) => {
    const place = (i * 0.6180339887498949) % 1;
    return Math.min(20, 1e-4 * Math.exp(span * place));
  });
}

/** Shortest of several runs, in nanoseconds per value: what the machine can do when nobody interrupts. */
function shortest(repeats, count, work) {
  let best = Infinity;
  for (let i = 0; i < repeats; i++) {
    const start = process.hrtime.bigint();
    work();
    best = Math.min(best, Number(process.hrtime.bigint() - start) / count);
  }
  return best;
}

/** astropy integrates with scipy, which is only recommended by its Debian package: a distance tells whether both are there. */
const PROBE = 'from astropy.cosmology import Planck18; Planck18.luminosity_distance(1.0)';

const ASTROPY = `
import json, sys, time
import numpy as np
import astropy
from astropy.cosmology import Planck18
z = np.frombuffer(sys.stdin.buffer.read(), dtype='<f8')
Planck18.luminosity_distance(z[:100])
best = float('inf')
sample = []
for part in np.split(z, 4):
    start = time.perf_counter()
    d = Planck18.luminosity_distance(part).value
    best = min(best, (time.perf_counter() - start) / len(part))
    sample += d[::1000].tolist()
print(json.dumps({'version': astropy.__version__, 'nanoseconds': best * 1e9, 'sample': sample}))
`;

/** astropy's time (the best of four calls with a quarter each) and a sample of its values for the same redshifts, or undefined where it (or the scipy it needs) is missing. */
function measureAstropy(redshifts) {
  for (const python of ['/usr/bin/python3', 'python3']) {
    const probe = spawnSync(python, ['-c', PROBE], { stdio: 'ignore' });
    if (probe.status !== 0) continue;
    const result = spawnSync(python, ['-c', ASTROPY], {
      input: Buffer.from(redshifts.buffer),
      maxBuffer: 1 << 28,
    });
    if (result.status !== 0) throw new Error(`astropy failed: ${result.stderr}`);
    return JSON.parse(result.stdout.toString());
  }
  return undefined;
}

/** Runs the benchmark and prints it; resolves to the figures. */
export async function run({ astropyCount = COUNT } = {}) {
  const redshifts = redshiftsFor(COUNT);
  const result = new Float64Array(COUNT);

  const cold = createCosmology('planck18');
  const startOfTable = process.hrtime.bigint();
  luminosityDistancesMpc(cold, Float64Array.of(1));
  const tableMs = Number(process.hrtime.bigint() - startOfTable) / 1e6;

  const model = createCosmology('planck18');
  luminosityDistancesMpc(model, redshifts, result);
  const batchNs = shortest(REPEATS, COUNT, () => luminosityDistancesMpc(model, redshifts, result));

  const sample = redshifts.subarray(0, DIRECT_COUNT);
  const direct = new Float64Array(DIRECT_COUNT);
  const directNs = shortest(2, DIRECT_COUNT, () => {
    for (let i = 0; i < DIRECT_COUNT; i++) direct[i] = model.luminosityDistanceMpc(sample[i]);
  });
  const rowNs = shortest(3, ROW_COUNT, () => distanceRows(model, redshifts.subarray(0, ROW_COUNT)));

  let worst = 0;
  for (let i = 0; i < DIRECT_COUNT; i++) worst = Math.max(worst, Math.abs(result[i] / direct[i] - 1));
  const far = Float64Array.of(1e-6, 1e-5, 100, 1000, 1100);
  const farBatch = luminosityDistancesMpc(model, far);
  let worstFar = 0;
  far.forEach((z, i) => (worstFar = Math.max(worstFar, Math.abs(farBatch[i] / model.luminosityDistanceMpc(z) - 1))));

  console.log('Luminosity distances, planck18 (massive neutrinos), 1e-4 ≤ z ≤ 20, random order');
  console.log(`  batch of ${COUNT.toLocaleString('en')}:    ${batchNs.toFixed(1)} ns per value`);
  console.log(`  table, made once:       ${tableMs.toFixed(1)} ms (in a cold process)`);
  console.log(
    `  direct quadrature:      ${directNs.toFixed(0)} ns per value, ratio ${(directNs / batchNs).toFixed(0)}`,
  );
  console.log(`  all columns as rows:    ${rowNs.toFixed(0)} ns per row`);
  console.log(
    `  largest relative error: ${worst.toExponential(1)} (${DIRECT_COUNT.toLocaleString('en')} values against direct)`,
  );
  console.log(`  at z = 1e-6 … 1100:     ${worstFar.toExponential(1)}`);

  const figures = { batchNs, tableMs, directNs, rowNs, directRatio: directNs / batchNs, worst, worstFar };
  const astropy = measureAstropy(redshifts.slice(0, astropyCount));
  if (!astropy) {
    console.log('  astropy:                cannot be used here (needs python3-astropy and python3-scipy)');
    return figures;
  }
  const astropyNs = astropy.nanoseconds;
  let apart = 0;
  astropy.sample.forEach((value, i) => (apart = Math.max(apart, Math.abs(result[i * 1000] / value - 1))));
  console.log(
    `  astropy ${astropy.version}, vectorised, ${astropyCount.toLocaleString('en')} values: ${astropyNs.toFixed(0)} ns per value, ratio ${(astropyNs / batchNs).toFixed(0)}; values apart by at most ${apart.toExponential(1)}`,
  );
  return { ...figures, astropyNs, astropyRatio: astropyNs / batchNs, apart };
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) await run();
