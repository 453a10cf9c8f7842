import type { DistanceRow, DistancesResponse } from '@faintward/contracts/distances';
import { distanceQuantities, type DistanceQuantity } from '../../ui/distanceQuantities';

/** What may be drawn over redshift: one quantity, several of a kind, or the angle of a given length. */
export interface CurveChoice {
  id: string;
  title: string;
  /** Heading in the list of choices. */
  group: string;
  label: string;
  unit: string;
  scale: 'linear' | 'log';
  lines: readonly { name: string; value: (row: DistanceRow, sizeKpc: number) => number | null }[];
  /** How two cosmologies compare: magnitudes by their difference, all else by their ratio. */
  compares: 'ratio' | 'difference';
}

type Field = DistanceQuantity['field'];
const of = (field: Field) => (row: DistanceRow) => row[field];

/** Angle that a proper length spans; none at z = 0, where it has no bound. */
export function angleArcsec(row: Pick<DistanceRow, 'kpcPerArcsec'>, sizeKpc: number): number | null {
  return row.kpcPerArcsec > 0 && sizeKpc > 0 ? sizeKpc / row.kpcPerArcsec : null;
}

const together: readonly Omit<CurveChoice, 'group' | 'compares'>[] = [
  {
    id: 'distances',
    title: 'Three distances',
    label: 'distance',
    unit: 'Mpc',
    scale: 'log',
    lines: [
      { name: 'luminosity', value: of('luminosityDistanceMpc') },
      { name: 'comoving', value: of('comovingDistanceMpc') },
      { name: 'angular diameter', value: of('angularDiameterDistanceMpc') },
    ],
  },
  {
    id: 'time',
    title: 'Age and lookback',
    label: 'time',
    unit: 'Gyr',
    scale: 'linear',
    lines: [
      { name: 'age', value: of('ageGyr') },
      { name: 'lookback', value: of('lookbackTimeGyr') },
    ],
  },
  {
    id: 'dimming',
    title: 'Dimming, four conventions',
    label: 'dimming',
    unit: 'mag/″²',
    scale: 'linear',
    lines: [
      { name: 'per wavelength', value: of('perWavelengthDimmingMag') },
      { name: 'in energy', value: of('bolometricDimmingMag') },
      { name: 'per frequency, and in photons', value: of('perFrequencyDimmingMag') },
    ],
  },
  {
    id: 'angle',
    title: 'Angle of a given length',
    label: 'angle',
    unit: '″',
    scale: 'log',
    lines: [{ name: 'angle', value: angleArcsec }],
  },
];

const logFields: readonly Field[] = [
  'luminosityDistanceMpc',
  'comovingDistanceMpc',
  'transverseComovingDistanceMpc',
  'angularDiameterDistanceMpc',
  'comovingVolumeMpc3',
  'hubbleKmSMpc',
  'criticalDensityGCm3',
];

/** Identifiers of links from before every quantity had its own curve. */
const formerIds: Record<string, string> = {
  scale: 'kpcPerArcsec',
  modulus: 'distanceModulusMag',
  expansion: 'hubbleKmSMpc',
};

export const curveChoices: readonly CurveChoice[] = [
  ...together.map((choice) => ({ ...choice, group: 'Together', compares: comparesBy(choice.unit) })),
  ...distanceQuantities.map<CurveChoice>((quantity) => ({
    id: quantity.field,
    title: quantity.label,
    group: quantity.group,
    label: quantity.symbol,
    unit: quantity.unit,
    scale: logFields.includes(quantity.field) ? 'log' : 'linear',
    lines: [{ name: quantity.symbol, value: of(quantity.field) }],
    compares: comparesBy(quantity.unit),
  })),
];

function comparesBy(unit: string): CurveChoice['compares'] {
  return unit.startsWith('mag') ? 'difference' : 'ratio';
}

export function curveOf(id: string): CurveChoice {
  return curveChoices.find((choice) => choice.id === (formerIds[id] ?? id)) ?? curveChoices[0]!;
}

export interface Curve {
  cosmologyId: string;
  title: string;
  line: string;
  values: { x: number; y: number | null }[];
}

/** One curve for each line of the choice and each cosmology. */
export function curvesOf(choice: CurveChoice, models: readonly DistancesResponse[], sizeKpc: number): Curve[] {
  return models.flatMap((model) =>
    choice.lines.map((line) => ({
      cosmologyId: model.cosmology.id,
      title: model.cosmology.title,
      line: line.name,
      values: model.rows.map((row) => ({ x: row.redshift, y: line.value(row, sizeKpc) })),
    })),
  );
}

/**
 * Every further cosmology against the first, line by line: the ratio, or for magnitudes the difference. Where either has no
 * value or the first is 0 there is none. Redshifts that the two do not share are left out.
 */
export function againstFirst(choice: CurveChoice, models: readonly DistancesResponse[], sizeKpc: number): Curve[] {
  const [first, ...others] = models;
  if (!first) return [];
  const base = curvesOf(choice, [first], sizeKpc);
  return curvesOf(choice, others, sizeKpc).map((curve) => {
    const reference = new Map(base.find((one) => one.line === curve.line)?.values.map(({ x, y }) => [x, y]));
    return {
      ...curve,
      values: curve.values
        .filter(({ x }) => reference.has(x))
        .map(({ x, y }) => ({ x, y: compare(choice.compares, y, reference.get(x) ?? null) })),
    };
  });
}

function compare(how: CurveChoice['compares'], value: number | null, reference: number | null): number | null {
  if (value === null || reference === null) return null;
  if (how === 'difference') return value - reference;
  return reference === 0 ? null : value / reference;
}
