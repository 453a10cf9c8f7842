/**
 * What hydrogen between the galaxies takes of a V magnitude, summed plainly from the published formulas and tables of
 * Inoue et al. 2014 (MNRAS 442, 1805) and the V response, without the product's libraries.
 */
import { readFileSync } from 'node:fs';
import path from 'node:path';

const folder = path.resolve(import.meta.dirname, '../../seed/reference');
const read = (name: string) => (JSON.parse(readFileSync(path.join(folder, name), 'utf8')) as { data: never }).data;

interface Band {
  id: string;
  wavelengthsNm: number[];
  response: number[];
}
interface Inoue {
  lymanLimitNm: number;
  lineWavelengthsNm: number[];
  lineSeries: { branches: { ratioBelow: number | null; power: number; coefficients: number[] }[] }[];
  continuum: {
    epochs: {
      redshiftBelow: number | null;
      branches: {
        ratioBelow: number | null;
        terms: { coefficient: number; redshiftPower: number; ratioPower: number }[];
      }[];
    }[];
  }[];
}

const below = (value: number, bound: number | null) => bound === null || value < bound;

function opticalDepth(table: Inoue, observedNm: number, redshift: number): number {
  let depth = 0;
  table.lineWavelengthsNm.forEach((lineNm, j) => {
    const ratio = observedNm / lineNm;
    if (ratio <= 1 || ratio >= 1 + redshift) return;
    for (const { branches } of table.lineSeries) {
      const branch = branches.find(({ ratioBelow }) => below(ratio, ratioBelow));
      if (branch) depth += (branch.coefficients[j] ?? 0) * ratio ** branch.power;
    }
  });
  const ratio = observedNm / table.lymanLimitNm;
  if (ratio > 1 && ratio < 1 + redshift) {
    for (const { epochs } of table.continuum) {
      const epoch = epochs.find(({ redshiftBelow }) => below(redshift, redshiftBelow));
      const branch = epoch?.branches.find(({ ratioBelow }) => below(ratio, ratioBelow));
      for (const { coefficient, redshiftPower, ratioPower } of branch?.terms ?? []) {
        depth += coefficient * (1 + redshift) ** redshiftPower * ratio ** ratioPower;
      }
    }
  }
  return Math.max(0, depth);
}

const table: Inoue = read('igm-inoue2014.json');
const { bands }: { bands: Band[] } = read('bands.json');
const visual = bands.find(({ id }) => id === 'V') ?? { wavelengthsNm: [], response: [] };
const stepNm = 0.1;

/** Magnitudes by which hydrogen dims a flat f_ν in V: what a measured V magnitude already contains. */
export function hydrogenInVMag(redshift: number): number {
  const { wavelengthsNm, response } = visual;
  let left = 0;
  let all = 0;
  for (let i = 0; i + 1 < wavelengthsNm.length; i++) {
    const [from = NaN, to = NaN] = [wavelengthsNm[i], wavelengthsNm[i + 1]];
    const [rFrom = NaN, rTo = NaN] = [response[i], response[i + 1]];
    const count = Math.max(1, Math.round((to - from) / stepNm));
    for (let k = 0; k < count; k++) {
      const t = (k + 0.5) / count;
      const nm = from + t * (to - from);
      const photons = ((rFrom + t * (rTo - rFrom)) * (to - from)) / count / nm;
      all += photons;
      left += photons * Math.exp(-opticalDepth(table, nm, redshift));
    }
  }
  return -2.5 * Math.log10(left / all);
}
