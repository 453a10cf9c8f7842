import { gaussLegendre } from '@faintward/numerics';
import type { Provenance } from './provenance.js';
import { OutOfDomainError, requireRedshift } from './domain.js';
import type { ReferenceFile } from './sources/templates.js';

/** The cosmology that a published value was derived with, as far as it was said. */
export interface DerivedWith {
  /** The nearest preset. */
  readonly presetId: string;
  readonly hubbleConstantKmSMpc: number;
  readonly omegaMatter: number;
}

interface Sourced {
  readonly source: string;
  readonly provenance: Provenance;
}

/** A Schechter function: φ(M) = 0.4 ln 10 φ* 10^(−0.4 (M − M*) (α + 1)) exp(−10^(−0.4 (M − M*))). */
export interface LuminosityFunctionRow {
  readonly redshift: number;
  /** M*. */
  readonly magnitudeAb: number;
  /** φ*. */
  readonly densityPerMpc3: number;
  /** α. */
  readonly faintEndSlope: number;
}

/** A published relation of sizes, by author, year and kind of galaxy. */
export type SizeRelationId = 'shibuya2015' | 'vanDerWel2014Late' | 'vanDerWel2014Early';

/** Half-light radius as powers of 1 + z and of luminosity or mass. */
export interface SizeRelationRow extends Sourced {
  readonly title: string;
  /** At redshift 0 and the reference luminosity or mass. */
  readonly sizeKpc: number;
  /** Of 1 + z. */
  readonly redshiftPower: number;
  readonly luminosityPower?: number;
  readonly atMagnitudeUvAb?: number;
  readonly massPower?: number;
  readonly atMassSolar?: number;
  readonly lowestMassSolar?: number;
  readonly lowestRedshift: number;
  readonly highestRedshift: number;
  readonly axis: string;
  readonly sersicIndex: number | null;
  readonly spreadText: string;
}

/** The numbers of `typical-values.json`. */
export interface TypicalValues {
  readonly ultravioletLuminosityFunction: Sourced & {
    readonly restWavelengthNm: number;
    readonly derivedWith: DerivedWith;
    /** Ascending in redshift, like those beyond, which begin where these end. */
    readonly rows: readonly LuminosityFunctionRow[];
    readonly beyond: Sourced & { readonly derivedWith: DerivedWith; readonly rows: readonly LuminosityFunctionRow[] };
    readonly below: Sourced & { readonly magnitudePerRedshift: number };
  };
  readonly ultravioletSlope: Sourced & {
    readonly slopeAt: number;
    readonly atMagnitudeAb: number;
    readonly slopePerMagnitude: number;
    readonly lowestRedshift: number;
    readonly highestRedshift: number;
  };
  readonly sizes: Readonly<Record<SizeRelationId, SizeRelationRow>>;
  readonly lineWidths: readonly {
    readonly id: 'galaxyLineWidth' | 'quasarLineWidth';
    readonly title: string;
    readonly velocityWidthKmS: number;
    readonly spreadText: string;
    readonly provenance: Provenance;
  }[];
  readonly supernovaIa: Sourced & {
    readonly peakMagnitudeVega: number;
    readonly bandId: 'B';
    readonly sigmaMag: number;
    readonly spreadText: string;
    readonly derivedWith: DerivedWith;
  };
}

/** Its file under `seed/reference`. */
export const TYPICAL_VALUES_FILE_NAME = 'typical-values.json';
/** `typical-values.json`. */
export type TypicalValuesFile = ReferenceFile<TypicalValues>;

/** M* at a redshift, with what it rests on. */
export interface TypicalUvMagnitude extends Sourced {
  /** M* of the ultraviolet luminosity function. */
  readonly magnitudeAb: number;
  readonly restWavelengthNm: number;
  readonly derivedWith: DerivedWith;
  /** Outside 2.1 to 8.9, where the table ends. */
  readonly isExtrapolated: boolean;
  readonly validText: string;
}

/**
 * Absolute ultraviolet magnitude of a bright, not exceptional, galaxy of young stars: M*, straight in redshift between the rows of the
 * table. Below its first row it fades towards the present, above its last the later publication's rows continue it, and beyond
 * the last of those it stays; all three are flagged. Continuous in redshift.
 */
export function typicalUvMagnitude(redshift: number, values: TypicalValues): TypicalUvMagnitude {
  requireRedshift(redshift);
  const { restWavelengthNm, derivedWith, rows, beyond, below, source, provenance } =
    values.ultravioletLuminosityFunction;
  const first = rows[0]!;
  const last = rows.at(-1)!;
  const shared = { restWavelengthNm, validText: `Measured at redshift ${first.redshift} to ${last.redshift}` };
  if (redshift < first.redshift) {
    const magnitudeAb = first.magnitudeAb + below.magnitudePerRedshift * (redshift - first.redshift);
    const validText = `${shared.validText}; continued downwards: ${below.source}.`;
    return { ...shared, ...provenanceOf(below), magnitudeAb, derivedWith, isExtrapolated: true, validText };
  }
  if (redshift <= last.redshift) {
    const validText = `${shared.validText}.`;
    return {
      ...shared,
      source,
      provenance,
      magnitudeAb: between(rows, redshift),
      derivedWith,
      isExtrapolated: false,
      validText,
    };
  }
  const validText = `${shared.validText}; continued by ${beyond.source}, measured to redshift ${beyond.rows.at(-1)!.redshift}.`;
  return {
    ...shared,
    ...provenanceOf(beyond),
    magnitudeAb: between([last, ...beyond.rows], redshift),
    derivedWith: beyond.derivedWith,
    isExtrapolated: true,
    validText,
  };
}

function provenanceOf({ source, provenance }: Sourced): Sourced {
  return { source, provenance };
}

/** M* straight between rows; beyond the last, that of the last. */
function between(rows: readonly LuminosityFunctionRow[], redshift: number): number {
  const after = rows.findIndex((row) => row.redshift > redshift);
  if (after === -1) return rows.at(-1)!.magnitudeAb;
  if (after === 0) return rows[0]!.magnitudeAb;
  const [low, high] = [rows[after - 1]!, rows[after]!];
  const t = (redshift - low.redshift) / (high.redshift - low.redshift);
  return low.magnitudeAb * (1 - t) + high.magnitudeAb * t;
}

/**
 * Galaxies brighter than a magnitude, per comoving Mpc³: φ* Γ(α + 1, 10^(−0.4 (M − M*))). Relative error below 1e-6 for magnitudes
 * up to 3 fainter than M*.
 *
 * @see Schechter 1976, ApJ 203, 297
 */
export function brighterThanPerMpc3(magnitudeAb: number, row: LuminosityFunctionRow): number {
  const least = 10 ** (-0.4 * (magnitudeAb - row.magnitudeAb));
  // In ln t the integrand is smooth; beyond t = least + 60 there is nothing.
  const tail = gaussLegendre(
    (logT) => Math.exp((row.faintEndSlope + 1) * logT - Math.exp(logT)),
    Math.log(least),
    Math.log(least + 60),
    64,
  );
  return row.densityPerMpc3 * tail;
}

/** The row of the luminosity function, of either publication, nearest in redshift. */
export function nearestLuminosityFunction(redshift: number, values: TypicalValues): LuminosityFunctionRow {
  const { rows, beyond } = values.ultravioletLuminosityFunction;
  return [...rows, ...beyond.rows].reduce((best, row) =>
    Math.abs(row.redshift - redshift) < Math.abs(best.redshift - redshift) ? row : best,
  );
}

/** What a size depends on beside the redshift. */
export interface SizeDependence {
  /** For relations by ultraviolet luminosity; that of the relation, −21, if left out. */
  readonly absoluteMagnitudeUv?: number;
  /** For relations by mass. */
  readonly stellarMassSolar: number;
}

/** Half-light radius in proper kpc of a published relation; see the relation's row for its range and which radius it is. */
export function typicalSizeKpc(
  relation: SizeRelationId,
  redshift: number,
  { absoluteMagnitudeUv, stellarMassSolar }: SizeDependence,
  values: TypicalValues,
): number {
  requireRedshift(redshift);
  const row = values.sizes[relation];
  const atZero = row.sizeKpc * (1 + redshift) ** row.redshiftPower;
  if (row.luminosityPower !== undefined && row.atMagnitudeUvAb !== undefined) {
    const brighter = row.atMagnitudeUvAb - (absoluteMagnitudeUv ?? row.atMagnitudeUvAb);
    return atZero * 10 ** (0.4 * brighter * row.luminosityPower);
  }
  if (row.massPower === undefined || row.atMassSolar === undefined) return atZero;
  if (!(stellarMassSolar > 0 && stellarMassSolar < Infinity)) {
    throw new OutOfDomainError('stellarMassSolar', stellarMassSolar, 'a finite number above 0');
  }
  return atZero * (stellarMassSolar / row.atMassSolar) ** row.massPower;
}

/** β of f_λ ∝ λ^β in the ultraviolet by absolute magnitude. */
export function typicalUvSlope(absoluteMagnitudeUv: number, values: TypicalValues): number {
  const { slopeAt, atMagnitudeAb, slopePerMagnitude } = values.ultravioletSlope;
  return slopeAt + slopePerMagnitude * (absoluteMagnitudeUv - atMagnitudeAb);
}

/**
 * Absolute Vega magnitude in B of a type Ia supernova at its maximum: the measured one scales with the distance ladder,
 * +5 log10(H0 / 73.04), so that apparent magnitudes in the Hubble flow stay the same.
 */
export function supernovaIaPeakMagnitude(hubbleConstantKmSMpc: number, values: TypicalValues): number {
  if (!(hubbleConstantKmSMpc > 0 && hubbleConstantKmSMpc < Infinity)) {
    throw new OutOfDomainError('hubbleConstantKmSMpc', hubbleConstantKmSMpc, 'a finite number above 0');
  }
  const { peakMagnitudeVega, derivedWith } = values.supernovaIa;
  return peakMagnitudeVega + 5 * Math.log10(hubbleConstantKmSMpc / derivedWith.hubbleConstantKmSMpc);
}
