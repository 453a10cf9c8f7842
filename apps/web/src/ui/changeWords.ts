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
  magnitudeAb: 'magnitude (AB)',
  slopeBeta: 'slope β',
  restWavelengthNm: 'rest wavelength (nm)',
  restBandId: 'band in the rest frame',
  velocityWidthKmS: 'velocity width (km/s)',
  restEquivalentWidthNm: 'equivalent width (nm, rest)',
  solarMassesPerYear: 'star-formation rate (M☉/yr)',
  derivedWith: 'derived with',
  hubbleConstantKmSMpc: 'H₀ (km/s/Mpc)',
  omegaMatter: 'Ω_m',
  includes: 'contains',
  hostDust: 'dust in its host',
  galacticDust: 'Galactic dust',
  colourExcessMag: 'E(B−V)',
  totalToSelective: 'R_V',
  lensing: 'magnification',
  magnification: 'magnification μ',
  sigmaLnMagnification: 'σ of ln μ',
  intergalactic: 'intergalactic medium',
  breakRatio: 'break ratio',
  lymanAlphaNm: 'Lyα (nm)',
  oxygenIINm: '[O II] (nm)',
  oxygenIIIHydrogenBetaNm: '[O III] + Hβ (nm)',
  hydrogenAlphaNm: 'Hα (nm)',
  phaseDays: 'phase (d)',
  temperatureK: 'temperature (K)',
  spectrumId: 'spectrum of ours',
  stellarMassSolar: 'stellar mass (M☉)',
  sersicIndex: 'Sérsic index',
  redshiftUncertainty: 'uncertainty of the redshift',
  redshiftKind: 'kind of redshift',
  p16: '16 %',
  p50: '50 %',
  p84: '84 %',
  sigma: '1 σ',
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
      .filter((path) => old.get(path)?.key !== now.get(path)?.key)
      .map((path) => {
        const [was, is] = [old.get(path)?.words ?? unknown, now.get(path)?.words ?? unknown];
        return { label: labelOf(path), before: was, after: was === is ? `${is}, others` : is };
      });
  });
}

const unknown = '—';
/** Longer lists of numbers, such as a table of probabilities, are counted instead of written. */
const longestWrittenList = 12;

interface Leaf {
  /** Tells whether two are the same. */
  key: string;
  words: string;
}

/** Every end of a structure with its path; lists stay whole. */
function leaves(value: unknown, path: string): Map<string, Leaf> {
  if (value === null || value === undefined || value === '') return new Map();
  if (Array.isArray(value) && value.length === 0) return new Map();
  if (Array.isArray(value) || typeof value !== 'object') {
    return new Map([[path, { key: JSON.stringify(value), words: inWords(value) }]]);
  }
  return new Map(Object.entries(value).flatMap(([key, inner]) => [...leaves(inner, `${path}.${key}`)]));
}

function labelOf(path: string): string {
  return path
    .split('.')
    .map((part) => labels[part] ?? part.replaceAll(/([a-z0-9])([A-Z])/g, '$1 $2').toLowerCase())
    .join(', ');
}

function inWords(value: unknown): string {
  if (value === null || value === undefined || value === '') return unknown;
  if (Array.isArray(value)) {
    const areNumbers = value.every((one) => typeof one === 'number');
    if (areNumbers && value.length > longestWrittenList) return `${value.length} numbers`;
    return cut(value.map((one) => inWords(one)).join(', '));
  }
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (typeof value === 'number') return String(value).replace(/^-/, '−');
  if (typeof value === 'string') {
    if (/^\d{4}-\d\d-\d\dT.*Z$/.test(value) && !Number.isNaN(Date.parse(value))) {
      return `${formatInstant(new Date(value), 'UTC')} UTC`;
    }
    return cut(value);
  }
  return JSON.stringify(value);
}

function cut(text: string): string {
  return text.length > 160 ? `${text.slice(0, 160)}…` : text;
}
