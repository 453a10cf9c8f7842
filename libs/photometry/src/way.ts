/** What a spectrum meets on its way, tabulated on its own points. Tables are kept with the points they belong to. */
import {
  attenuationOnNodes,
  defaultTotalToSelective,
  requireColourExcess,
  trueColourExcess,
  type DustLaw,
} from './dust.js';
import type { IntergalacticMedium } from './intergalactic.js';
import { firstAbove, type SampledCurve } from './sampled-curve.js';
import type { GalacticDustScreen, HostDustScreen } from './source-light.js';

/** Spectra of one kind share their points; so many tables are kept with them, of what people choose by turns. */
const MOST_KEPT_TABLES = 32;

/** Tables by the points of the spectrum: spectra of one kind share them, and so share what was worked out on them. */
function keptByNodes<Table>(make: (nodesNm: Float64Array, key: string) => Table) {
  const kept = new WeakMap<Float64Array, Map<string, Table>>();
  return (nodesNm: Float64Array, key: string): Table => {
    let ofNodes = kept.get(nodesNm);
    if (ofNodes === undefined) kept.set(nodesNm, (ofNodes = new Map()));
    let table = ofNodes.get(key);
    if (table === undefined) {
      if (ofNodes.size >= MOST_KEPT_TABLES) ofNodes.clear();
      ofNodes.set(key, (table = make(nodesNm, key)));
    }
    return table;
  };
}

const media = new WeakMap<IntergalacticMedium, ReturnType<typeof forestTables>>();

function forestTables(medium: IntergalacticMedium) {
  return keptByNodes((nodesNm) => {
    const count = firstAbove(nodesNm, medium.jumpsRestNm.at(-1)!);
    return { count, onNodes: medium.onNodes(nodesNm.subarray(0, count)) };
  });
}

/** Mean transmission of a medium at points of a spectrum; beyond them everything comes through. */
export interface Forest {
  /** Index of the point that the first value belongs to. */
  readonly first: number;
  readonly transmission: Float64Array;
}

/** From the point at or before a rest wavelength up to Lyα as the medium has it. */
export function forestFrom(
  restNm: number,
  medium: IntergalacticMedium,
  nodesNm: Float64Array,
  redshift: number,
): Forest {
  let tables = media.get(medium);
  if (tables === undefined) media.set(medium, (tables = forestTables(medium)));
  const { count, onNodes } = tables(nodesNm, '');
  // A jump stands twice, and rounding must not take one of its points away.
  const first = Math.min(Math.max(firstAbove(nodesNm, restNm) - 3, 0), count);
  const transmission = new Float64Array(count - first);
  onNodes.transmission(redshift, transmission, first);
  return { first, transmission };
}

const hostTables = keptByNodes((nodesNm, key) => {
  const [law, ratio] = key.split(' ');
  return attenuationOnNodes(law as DustLaw, Number(ratio), nodesNm);
});

/** A(λ)/A(V) of dust in the source, at the points of its spectrum, and A(V). */
export function hostDustOn(screen: HostDustScreen, nodesNm: Float64Array): { shape: Float64Array; visualMag: number } {
  requireColourExcess(screen.colourExcessMag);
  const ratio = screen.totalToSelective ?? defaultTotalToSelective(screen.law);
  return { shape: hostTables(nodesNm, `${screen.law} ${ratio}`), visualMag: ratio * screen.colourExcessMag };
}

/** Step in ln λ of the table of Galactic dust: straight lines on it are within 1e-6 of the laws. */
const GALACTIC_STEP = 1e-3;
const GALACTIC_LOW_NM = 90;
const GALACTIC_COUNT = Math.ceil(Math.log(60_000 / GALACTIC_LOW_NM) / GALACTIC_STEP) + 1;
const galacticTables = new Map<DustLaw, Float64Array>();

function galacticTable(law: DustLaw): Float64Array {
  let table = galacticTables.get(law);
  if (table === undefined) {
    const nodesNm = Float64Array.from(
      { length: GALACTIC_COUNT },
      (_, i) => GALACTIC_LOW_NM * Math.exp(i * GALACTIC_STEP),
    );
    galacticTables.set(law, (table = attenuationOnNodes(law, defaultTotalToSelective(law), nodesNm)));
  }
  return table;
}

/** Attenuation by the Milky Way in magnitudes, at the logarithm of an observed wavelength in nm. */
export function galacticDustOf(screen: GalacticDustScreen): (logObservedNm: number) => number {
  const table = galacticTable(screen.law);
  const visualMag = defaultTotalToSelective(screen.law) * trueColourExcess(screen.colourExcessMag, screen.scale);
  const logLow = Math.log(GALACTIC_LOW_NM);
  return (logObservedNm) => {
    const position = (logObservedNm - logLow) / GALACTIC_STEP;
    const index = Math.min(Math.max(Math.floor(position), 0), GALACTIC_COUNT - 2);
    const t = Math.min(Math.max(position - index, 0), 1);
    return visualMag * (table[index]! * (1 - t) + table[index + 1]! * t);
  };
}

const logTables = keptByNodes((nodesNm) => nodesNm.map(Math.log));

/** ln λ of the points of a spectrum. */
export function logarithmsOf(nodesNm: Float64Array): Float64Array {
  return logTables(nodesNm, '');
}

/** g = λ² f_λ ∝ f_ν of a spectrum f_λ, at the same points: what is straight between them. */
export interface FrequencyCurve extends SampledCurve {
  /** The shortest wavelength with light to the right of it; Infinity where there is none. */
  readonly litFromNm: number;
}

const frequencyCurves = new WeakMap<SampledCurve, FrequencyCurve>();

/** λ² f_λ of a spectrum; kept with it, so that lights of one spectrum share it. */
export function perFrequency(curve: SampledCurve): FrequencyCurve {
  const known = frequencyCurves.get(curve);
  if (known !== undefined) return known;
  const { wavelengthsNm, values } = curve;
  const firstLit = values.findIndex((value) => value > 0);
  const made = {
    wavelengthsNm,
    values: values.map((value, i) => value * wavelengthsNm[i]! * wavelengthsNm[i]!),
    litFromNm: wavelengthsNm[firstLit] ?? Infinity,
  };
  frequencyCurves.set(curve, made);
  return made;
}
