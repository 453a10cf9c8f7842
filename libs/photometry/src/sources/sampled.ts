import { limitAt, restGrid, sampleOn } from '../rest-grid.js';
import { sampledCurve, type SampledCurve } from '../sampled-curve.js';
import type { RestSpectrum } from './rest-spectrum.js';

/** A spectrum that somebody brought as a table. */
export interface SampledSource {
  readonly kind: 'sampled';
  readonly label: string;
  readonly source: string;
  /** Rest frame, vacuum, ascending. */
  readonly wavelengthsNm: ArrayLike<number>;
  /** f_λ on any scale. */
  readonly fluxPerWavelength: ArrayLike<number>;
}

/** A spectrum as given: its own points, and between them the common grid with its jumps, so that absorption can act. */
export function sampledSpectrum(source: SampledSource, jumpsNm: readonly number[]): RestSpectrum {
  const own = sampledCurve(source.wavelengthsNm, source.fluxPerWavelength);
  return {
    label: source.label,
    source: source.source,
    provenance: 'given',
    continuum: withGridNodes(own, jumpsNm),
    lines: [],
    validLowNm: own.wavelengthsNm[0]!,
    validHighNm: own.wavelengthsNm.at(-1)!,
    cautions: [],
  };
}

/** The same curve with the nodes of the common grid inside its range added; its own points and jumps stay as they are. */
export function withGridNodes(own: SampledCurve, jumpsNm: readonly number[]): SampledCurve {
  const { wavelengthsNm: ownNm } = own;
  const low = ownNm[0]!;
  const high = ownNm.at(-1)!;
  const added = restGrid(jumpsNm).filter((node) => node > low && node < high);
  const merged: number[] = [];
  let next = 0;
  for (let i = 0; i < ownNm.length;) {
    const here = ownNm[i]!;
    while (next < added.length && added[next]! < here) merged.push(added[next++]!);
    let copies = 0;
    while (added[next] === here) {
      copies++;
      next++;
    }
    let ownCopies = 0;
    while (ownNm[i] === here) {
      ownCopies++;
      i++;
    }
    for (let copy = 0; copy < Math.max(copies, ownCopies); copy++) merged.push(here);
  }
  return sampleOn(Float64Array.from(merged), (wavelengthNm, side) => limitAt(own, wavelengthNm, side));
}
