/** What a spectrum meets on its way, tabulated on its own points. Tables are kept with the points they belong to. */
import { attenuationOnNodes, defaultTotalToSelective, trueColourExcess, type DustLaw } from './dust.js';
import type { IntergalacticMedium } from './intergalactic.js';
import { firstAbove, type SampledCurve } from './sampled-curve.js';
import type { GalacticDustScreen, HostDustScreen } from './source-light.js';

/** Tables by the points of the spectrum: spectra of one kind share them, and so share what was worked out on them. */
function keptByNodes<Table>(make: (nodesNm: Float64Array, key: string) => Table) {
  const kept = new WeakMap<Float64Array, Map<string, Table>>();
  return (nodesNm: Float64Array, key: string): Table => {
    let ofNodes = kept.get(nodesNm);
    if (ofNodes === undefined) kept.set(nodesNm, (ofNodes = new Map()));
    let table = ofNodes.get(key);
    if (table === undefined) ofNodes.set(key, (table = make(nodesNm, key)));
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

/** Mean transmission at the first points of a spectrum, up to Lyα as the medium has it; beyond them everything comes through. */
export function forestTransmission(medium: IntergalacticMedium, nodesNm: Float64Array, redshift: number): Float64Array {
  let tables = media.get(medium);
  if (tables === undefined) media.set(medium, (tables = forestTables(medium)));
  const { count, onNodes } = tables(nodesNm, '');
  const out = new Float64Array(count);
  onNodes.transmission(redshift, out);
  return out;
}

const hostTables = keptByNodes((nodesNm, key) => {
  const [law, ratio] = key.split(' ');
  return attenuationOnNodes(law as DustLaw, Number(ratio), nodesNm);
});

/** A(λ)/A(V) of dust in the source, at the points of its spectrum, and A(V). */
export function hostDustOn(screen: HostDustScreen, nodesNm: Float64Array): { shape: Float64Array; visualMag: number } {
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

/** Attenuation by the Milky Way in magnitudes at observed wavelengths. */
export function galacticDustOf(screen: GalacticDustScreen): (observedNm: number) => number {
  const table = galacticTable(screen.law);
  const visualMag = defaultTotalToSelective(screen.law) * trueColourExcess(screen.colourExcessMag, screen.scale);
  const logLow = Math.log(GALACTIC_LOW_NM);
  return (observedNm) => {
    const position = (Math.log(observedNm) - logLow) / GALACTIC_STEP;
    const index = Math.min(Math.max(Math.floor(position), 0), GALACTIC_COUNT - 2);
    const t = Math.min(Math.max(position - index, 0), 1);
    return visualMag * (table[index]! * (1 - t) + table[index + 1]! * t);
  };
}

const frequencyShapes = new WeakMap<SampledCurve, SampledCurve>();

/** g = λ² f_λ ∝ f_ν of a spectrum f_λ, at the same points: what is straight between them. */
export function perFrequency(curve: SampledCurve): SampledCurve {
  const known = frequencyShapes.get(curve);
  if (known !== undefined) return known;
  const { wavelengthsNm, values } = curve;
  const made = { wavelengthsNm, values: values.map((value, i) => value * wavelengthsNm[i]! ** 2) };
  frequencyShapes.set(curve, made);
  return made;
}
