/*
 * Magnitudes of 10,000 targets of redshift 0.5 to 9 in five bands, through spectrum, dust and hydrogen, beside the same integral
 * done plainly: a loop over wavelengths for each target and band that asks for every factor anew. And 2,000 draws of an uncertain
 * redshift. Times are of the processor, so that other programs on the machine do not count.
 *
 *   npx tsc -b libs/photometry/tsconfig.build.json && node tests/bench/photometry.bench.mjs
 */
import { readdirSync, readFileSync } from 'node:fs';
import { pathToFileURL } from 'node:url';
import { createCosmology, luminosityDistancesMpc } from '@faintward/cosmology';
import {
  abMagnitudeOfPhotons,
  arrivingLight,
  attenuationMag,
  createBands,
  createInoue2014,
  createMadau1995,
  curveValueAt,
  forestNodesNm,
  galacticAttenuationMag,
  redshiftDistribution,
  responseOf,
  restSpectrum,
  sampleLight,
  sourceTemplates,
} from '@faintward/photometry';
import { photometryFilesFrom } from '@faintward/photometry/reference-files';

const COUNT = 10_000;
const PLAIN_COUNT = 100;
const REPEATS = 5;
const DRAWS = 2000;
const BANDS = ['g', 'r', 'z', 'J', 'Ks'];

const LYMAN_ALPHA_NM = 121.567;
/** Step in ln λ of the plain sum. */
const PLAIN_STEP = 2e-4;

/** What the application holds while it runs. */
function referenceData() {
  const folder = new URL('../../seed/reference/', import.meta.url);
  const names = readdirSync(folder).filter((name) => name.endsWith('.json'));
  const contents = names.map((name) => [name, JSON.parse(readFileSync(new URL(name, folder), 'utf8'))]);
  const files = photometryFilesFrom(new Map(contents));
  const medium = createInoue2014(files.intergalacticInoue2014.data);
  const jumps = [medium, createMadau1995(files.intergalacticMadau1995.data)].flatMap(forestNodesNm);
  const bands = Object.values(createBands(files.bands)).map((band) => [band.id, responseOf(band.curve)]);
  return {
    medium,
    jumpsNm: [...new Set(jumps)].sort((a, b) => a - b),
    templates: sourceTemplates(files),
    responses: Object.fromEntries(bands),
    distances: tabulated(createCosmology('planck18')),
    kept: new Map(),
  };
}

function tabulated(cosmology) {
  const one = new Float64Array(1);
  return {
    luminosityDistanceMpc(redshift) {
      one[0] = redshift;
      return luminosityDistancesMpc(cosmology, one)[0];
    },
  };
}

/** A mixed list, without chance: galaxies of young stars by slope, some with a break and lines, old galaxies, quasars. */
function targets(medium, responses) {
  return Array.from({ length: COUNT }, (_, i) => {
    const place = (i * 0.6180339887498949) % 1;
    const other = (i * 0.7548776662466927) % 1;
    const redshift = 0.5 + 8.5 * place;
    const isApparent = i % 2 === 0;
    const slopeBeta = Number((-2.8 + 1.6 * other).toFixed(2));
    const quoted = redshift > 6 ? 'J' : redshift > 3.5 ? 'z' : 'r';
    return {
      redshift,
      kind: kindOf(i % 10, slopeBeta, redshift),
      light: {
        kind: 'continuum',
        frame: isApparent ? 'observed' : 'rest',
        quoted: {
          kind: isApparent ? 'apparentMagnitude' : 'absoluteMagnitude',
          magnitude: isApparent ? 23 + 3 * other : -22 + 3 * other,
          toAbMag: 0,
          inputs: [],
        },
        at: isApparent
          ? { kind: 'response', response: responses[quoted], label: quoted }
          : { kind: 'wavelength', wavelengthNm: 150 },
        hostDust: i % 4 === 0 ? { law: 'calzetti2000', colourExcessMag: 0.05 + 0.3 * other } : null,
        galacticDust:
          i % 2 === 0 ? { law: 'fitzpatrick1999', colourExcessMag: 0.01 + 0.1 * place, scale: 'sfd' } : null,
        magnification: i % 20 === 0 ? 5 : 1,
        medium,
        includes: { hostDust: i % 3 !== 0, galacticDust: false, lensing: false },
      },
    };
  });
}

function kindOf(which, slopeBeta, redshift) {
  if (which === 7) return { kind: 'quasar', template: 'powerLaws' };
  if (which === 8) return { kind: 'quasar', template: 'hewettWild2010' };
  if (which === 9 && redshift < 3) return { kind: 'passive' };
  if (which > 3) return { kind: 'powerLaw', slopeBeta, escapeFraction: 0 };
  return {
    kind: 'starForming',
    slopeBeta,
    breakRatio: 1.2,
    lymanAlphaNm: which === 3 ? 3 : 0,
    oxygenIINm: 5,
    oxygenIIIHydrogenBetaNm: 20,
    hydrogenAlphaNm: 15,
  };
}

/** As the grid of targets does it: spectra are kept by kind, each target is followed through all bands. */
function inOneGo(list, { templates, jumpsNm, responses, distances, kept }) {
  return list.map(({ redshift, kind, light }) => {
    const key = JSON.stringify(kind);
    let spectrum = kept.get(key);
    if (spectrum === undefined) kept.set(key, (spectrum = restSpectrum(kind, templates, jumpsNm)));
    const arriving = arrivingLight({ ...light, spectrum }, redshift, distances);
    return BANDS.map((id) => arriving.magnitudeIn(responses[id]));
  });
}

/** The definition, written down: m = −2.5 log10(∫ λ f_λ S dλ / …) with every factor at every wavelength. */
function plainly({ redshift, kind, light }, { responses, distances, kept }) {
  const spectrum = kept.get(JSON.stringify(kind));
  const stretch = 1 + redshift;
  const passes = (observedNm, { host, forest, galactic }, alphaNm = LYMAN_ALPHA_NM) => {
    let mag = 0;
    const restNm = observedNm / stretch;
    if (host) mag += attenuationMag(host.law, restNm, host.colourExcessMag);
    if (galactic) mag += galacticAttenuationMag(observedNm, galactic.colourExcessMag, galactic.scale, galactic.law);
    const depth = forest && restNm < alphaNm ? light.medium.opticalDepth(observedNm, redshift) : 0;
    return 10 ** (-0.4 * mag) * Math.exp(-depth);
  };
  const magnitude = (response, met) => {
    let photons = 0;
    // A sum that steps over the edge at Lyα would be off by up to a hundredth of a magnitude.
    const edgeNm = Math.min(Math.max(LYMAN_ALPHA_NM * stretch, response.lowNm), response.highNm);
    for (const [lowNm, highNm] of [
      [response.lowNm, edgeNm],
      [edgeNm, response.highNm],
    ]) {
      const count = Math.ceil(Math.log(highNm / lowNm) / PLAIN_STEP);
      const step = Math.log(highNm / lowNm) / count;
      for (let i = 0; i < count; i++) {
        const nm = lowNm * Math.exp((i + 0.5) * step);
        const perRestNm = curveValueAt(spectrum.continuum, nm / stretch);
        photons += (nm / stretch) ** 2 * perRestNm * passes(nm, met) * curveValueAt(response.curve, nm) * step;
      }
    }
    for (const { restWavelengthNm, flux } of spectrum.lines) {
      const nm = restWavelengthNm * stretch;
      photons += restWavelengthNm * flux * passes(nm, met, 0.9999 * LYMAN_ALPHA_NM) * curveValueAt(response.curve, nm);
    }
    return abMagnitudeOfPhotons(photons, response);
  };
  const isApparent = light.frame === 'observed';
  const host = light.hostDust;
  const included = { host: light.includes.hostDust ? host : null, forest: isApparent, galactic: null };
  let reference = 0;
  if (isApparent) {
    reference = magnitude(light.at.response, included);
  } else {
    const { wavelengthNm } = light.at;
    const perFrequency = wavelengthNm ** 2 * curveValueAt(spectrum.continuum, wavelengthNm);
    const dust = included.host ? attenuationMag(host.law, wavelengthNm, host.colourExcessMag) : 0;
    reference = abMagnitudeOfPhotons(perFrequency, { logIntegral: 1 }) + dust;
  }
  const modulus = isApparent
    ? 0
    : 5 * Math.log10(distances.luminosityDistanceMpc(redshift)) + 25 - 2.5 * Math.log10(stretch);
  const lensing = -2.5 * Math.log10(light.magnification);
  const everything = { host, forest: true, galactic: light.galacticDust };
  return BANDS.map(
    (id) => light.quoted.magnitude + modulus + lensing + magnitude(responses[id], everything) - reference,
  );
}

/** Draws of a galaxy whose redshift is known to 3 %, so that Lyα wanders through the z band. */
function draws({ medium, templates, jumpsNm, responses, distances }) {
  const [{ light }] = targets(medium, responses);
  const spectrum = restSpectrum({ kind: 'powerLaw', slopeBeta: -2, escapeFraction: 0 }, templates, jumpsNm);
  const apparent = { ...light, at: { kind: 'response', response: responses.J, label: 'J' }, spectrum };
  return sampleLight({
    lightAt: () => apparent,
    redshifts: redshiftDistribution(6.3, { kind: 'gaussian', sigma: 0.2 }),
    sigmaMag: 0.1,
    sigmaLnMagnification: 0,
    distances,
    isSurface: false,
    response: responses.z,
    sampleCount: DRAWS,
    seed: 1,
  });
}

/** Shortest of several runs, in seconds of the processor. */
function shortest(repeats, work) {
  let best = Infinity;
  for (let i = 0; i < repeats; i++) {
    const start = process.cpuUsage();
    work();
    const { user, system } = process.cpuUsage(start);
    best = Math.min(best, (user + system) / 1e6);
  }
  return best;
}

/** Runs the benchmark and prints it; resolves to the figures. */
export async function run() {
  const data = referenceData();
  const list = targets(data.medium, data.responses);
  // Now and then in the list, over all redshifts and kinds.
  const every = COUNT / PLAIN_COUNT;
  const some = list.filter((_, i) => i % every === Math.floor(i / every) % 20);
  const firstSeconds = shortest(1, () => inOneGo(list, data));
  let fast = [];
  const seconds = Math.min(
    firstSeconds,
    shortest(REPEATS, () => (fast = inOneGo(list, data))),
  );
  let plain = [];
  const plainSeconds = shortest(1, () => (plain = some.map((target) => plainly(target, data))));
  const ratio = plainSeconds / some.length / (seconds / COUNT);

  let [compared, dark, worst] = [0, 0, 0];
  some.forEach((target, t) => {
    const found = fast[list.indexOf(target)];
    BANDS.forEach((_, b) => {
      if (typeof found[b] !== 'number') dark++;
      else {
        compared++;
        worst = Math.max(worst, Math.abs(found[b] - plain[t][b]));
      }
    });
  });
  const drawsSeconds = shortest(REPEATS, () => draws(data));

  console.log(`Light of ${COUNT.toLocaleString('en')} targets, 0.5 ≤ z ≤ 9, in ${BANDS.join(' ')}`);
  console.log(`  first time:             ${firstSeconds.toFixed(2)} s of one core, ${data.kept.size} spectra made`);
  console.log(`  with spectra made:      ${seconds.toFixed(2)} s, ${((seconds / COUNT) * 1e6).toFixed(0)} µs a target`);
  console.log(
    `  plainly, ${some.length} of them:   ${((plainSeconds / some.length) * 1e3).toFixed(1)} ms a target, ratio ${ratio.toFixed(0)}`,
  );
  console.log(
    `  apart by at most:       ${worst.toExponential(1)} mag (${compared} magnitudes; ${dark} bands without light)`,
  );
  console.log(`  ${DRAWS.toLocaleString('en')} draws of redshift:  ${(drawsSeconds * 1e3).toFixed(0)} ms`);
  return { firstSeconds, seconds, plainSeconds, ratio, compared, dark, worst, drawsSeconds };
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) await run();
