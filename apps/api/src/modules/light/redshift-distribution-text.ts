import type { Notice } from '@faintward/contracts/common';
import { MAX_DISTRIBUTION_POINTS } from '@faintward/contracts/light';
import type { RedshiftDistributionReading } from '@faintward/contracts/light-report';
import { HIGHEST_REDSHIFT, redshiftDistribution } from '@faintward/photometry';
import { parseDecimal, TableRefused } from '@faintward/tables';
import { uncertaintyFaults } from '../../engine/redshift-faults.js';
import { invalidField } from '../../platform/domain-error.js';
import { readNumberTable } from '../../platform/number-tables.js';

interface Point {
  row: number;
  redshift: number;
  density: number;
}

/**
 * Reads two columns of text, redshift and probability density, as a distribution, and says what it amounts to: percentiles and
 * peaks. Sorts by redshift; the scale of the densities does not matter.
 *
 * @throws {DomainError} `validation-failed` at `text`, naming the row that cannot be used
 */
export async function readRedshiftDistribution(text: string): Promise<RedshiftDistributionReading> {
  const notices: Notice[] = [];
  const points = await readPoints(text, notices);
  points.forEach(({ redshift, row }, index) => {
    const before = points[index - 1];
    if (before === undefined || before.redshift < redshift) return;
    const [first, second] = [before.row, row].sort((a, b) => a - b);
    throw refusal(`Rows ${first} and ${second} have the same redshift. Keep one of them.`);
  });
  const uncertainty = {
    kind: 'table' as const,
    redshifts: points.map(({ redshift }) => redshift),
    densities: points.map(({ density }) => density),
  };
  const redshift = points[0]?.redshift ?? 0;
  const [fault] = uncertaintyFaults({ redshift, redshiftUncertainty: uncertainty });
  if (fault !== undefined) throw refusal(`This is no distribution (${fault.path}). ${fault.message}`);
  const { quantile, peaks } = redshiftDistribution(redshift, uncertainty);
  return {
    uncertainty,
    quantiles: { p16: quantile(0.16), p50: quantile(0.5), p84: quantile(0.84) },
    peaks: peaks.map((peak) => ({ redshift: peak.redshift, probability: peak.probability })),
    notices,
  };
}

async function readPoints(text: string, notices: Notice[]): Promise<Point[]> {
  const { columns, rows, rowNumbers } = await readTable(text);
  if (columns.length > 2) {
    notices.push({
      code: 'moreColumns',
      message: 'Only the first two columns are read: redshift and probability density.',
      severity: 'note',
      field: 'text',
    });
  }
  const points = rows.map(([redshift = '', density = ''], index): Point => {
    const row = rowNumbers[index] ?? index + 1;
    const point = { row, redshift: numberOf(redshift, row), density: numberOf(density, row) };
    if (point.redshift < 0 || point.redshift > HIGHEST_REDSHIFT) {
      throw refusal(`Row ${row}: a redshift lies between 0 and ${HIGHEST_REDSHIFT}, not at ${redshift}.`);
    }
    if (point.density < 0) throw refusal(`Row ${row}: a probability density is 0 or more, not ${density}.`);
    return point;
  });
  return points.sort((a, b) => a.redshift - b.redshift);
}

async function readTable(text: string) {
  try {
    const table = await readNumberTable(text, MAX_DISTRIBUTION_POINTS);
    if (table.columns.length < 2) {
      throw refusal('A distribution has two columns, redshift and probability density; this text has one.');
    }
    if (table.rows.length < 2) throw refusal('A distribution needs at least two points.');
    return table;
  } catch (error) {
    if (error instanceof TableRefused) throw refusal(error.message);
    throw error;
  }
}

function numberOf(cell: string, row: number): number {
  const parsed = parseDecimal(cell);
  if (parsed.ok) return parsed.value;
  throw refusal(`Row ${row}: ${parsed.message}`);
}

function refusal(message: string) {
  return invalidField('text', message);
}
