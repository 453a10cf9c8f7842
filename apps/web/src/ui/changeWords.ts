import { formatInstant } from '../lib/time';

export interface ChangeLine {
  label: string;
  before: string;
  after: string;
}

interface FieldChange {
  field: string;
  before?: unknown;
  after?: unknown;
}

const labels: Record<string, string> = {
  signedAt: 'signed',
  importedCount: 'targets imported',
  skippedFaultyCount: 'skipped as faulty',
  skippedDuplicateCount: 'skipped as duplicates',
  bandId: 'band',
  sigmaMag: 'uncertainty (mag)',
  spectralSlopeBeta: 'spectral slope β',
  redshiftSigma: 'uncertainty of the redshift',
  rightAscensionDeg: 'right ascension (deg)',
  declinationDeg: 'declination (deg)',
  halfLightRadius: 'half-light radius',
  fluxErgSCm2: 'flux (erg/s/cm²)',
  luminosityErgS: 'luminosity (erg/s)',
  panelId: 'panel',
  partnerId: 'partner share',
};

/** Changes for people: of a structure only the parts that differ, names in words, instants in UTC. */
export function changeLines(changes: readonly FieldChange[]): ChangeLine[] {
  return changes.flatMap(({ field, before, after }) => {
    const [old, now] = [leaves(before, field), leaves(after, field)];
    return [...new Set([...old.keys(), ...now.keys()])]
      .filter((path) => old.get(path) !== now.get(path))
      .map((path) => ({ label: labelOf(path), before: inWords(old.get(path)), after: inWords(now.get(path)) }));
  });
}

/** Every end of a structure with its path; lists stay whole. */
function leaves(value: unknown, path: string): Map<string, unknown> {
  if (value === null || value === undefined || value === '') return new Map();
  if (Array.isArray(value) && value.length === 0) return new Map();
  if (Array.isArray(value)) return new Map([[path, value.map((one) => inWords(one)).join(', ')]]);
  if (typeof value !== 'object') return new Map([[path, value]]);
  return new Map(Object.entries(value).flatMap(([key, inner]) => [...leaves(inner, `${path}.${key}`)]));
}

function labelOf(path: string): string {
  return path
    .split('.')
    .map((part) => labels[part] ?? part.replaceAll(/([a-z0-9])([A-Z])/g, '$1 $2').toLowerCase())
    .join(', ');
}

function inWords(value: unknown): string {
  if (value === null || value === undefined || value === '') return '—';
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (typeof value === 'number') return String(value).replace(/^-/, '−');
  if (typeof value === 'string') {
    if (/^\d{4}-\d\d-\d\dT.*Z$/.test(value) && !Number.isNaN(Date.parse(value))) {
      return `${formatInstant(new Date(value), 'UTC')} UTC`;
    }
    return value.length > 160 ? `${value.slice(0, 160)}…` : value;
  }
  return JSON.stringify(value);
}
