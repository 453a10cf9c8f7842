import type { Provenance } from './provenance.js';
import {
  brighterThanPerMpc3,
  nearestLuminosityFunction,
  supernovaIaPeakMagnitude,
  typicalSizeKpc,
  typicalUvMagnitude,
  typicalUvSlope,
  type DerivedWith,
  type SizeRelationId,
  type TypicalValues,
} from './typical-values.js';

/** What can be suggested. */
export type TypicalValueId =
  | 'ultravioletMagnitude'
  | 'ultravioletSlope'
  | SizeRelationId
  | 'sersicIndex'
  | 'galaxyLineWidth'
  | 'quasarLineWidth'
  | 'supernovaIaPeak';

/** Something typical at a redshift: offered with its source, never used silently. */
export interface TypicalValue {
  readonly id: TypicalValueId;
  readonly title: string;
  /** The value in words, with its unit. */
  readonly valueText: string;
  readonly value: number;
  readonly unit: string;
  readonly spreadText: string | null;
  readonly source: string;
  readonly provenance: Provenance;
  /** Where it holds, and whether this redshift is inside. */
  readonly validText: string;
  readonly isExtrapolated: boolean;
  /** For luminosities: another cosmology needs M + DM of this one less DM of its own. */
  readonly derivedWith?: DerivedWith;
}

/** What is known of the source, so that suggestions can follow it. */
export interface SuggestionOptions {
  /** All relations if left out. */
  readonly relation?: SizeRelationId;
  /** Of the source, where it is known; M* if left out. */
  readonly absoluteMagnitudeUv?: number;
  /** 5e10 if left out. */
  readonly stellarMassSolar?: number;
  /** The supernova's magnitude goes with it; that of its publication if left out. */
  readonly hubbleConstantKmSMpc?: number;
}

const DEFAULT_MASS_SOLAR = 5e10;

/** What is typical at a redshift, in the order in which it is usually asked for. */
export function typicalValuesAt(
  redshift: number,
  values: TypicalValues,
  options: SuggestionOptions = {},
): readonly TypicalValue[] {
  const uv = ultravioletMagnitude(redshift, values);
  const magnitudeUv = options.absoluteMagnitudeUv ?? uv.value;
  const relations: readonly SizeRelationId[] =
    options.relation === undefined ? ['shibuya2015', 'vanDerWel2014Late', 'vanDerWel2014Early'] : [options.relation];
  const massSolar = options.stellarMassSolar ?? DEFAULT_MASS_SOLAR;
  return [
    uv,
    ultravioletSlope(redshift, magnitudeUv, values),
    ...relations.map((relation) => size(relation, redshift, magnitudeUv, massSolar, values)),
    sersicIndex(redshift, values),
    ...lineWidths(values),
    supernova(options.hubbleConstantKmSMpc ?? values.supernovaIa.derivedWith.hubbleConstantKmSMpc, values),
  ];
}

function ultravioletMagnitude(redshift: number, values: TypicalValues): TypicalValue {
  const { magnitudeAb, restWavelengthNm, ...rest } = typicalUvMagnitude(redshift, values);
  const row = nearestLuminosityFunction(redshift, values);
  const density = brighterThanPerMpc3(row.magnitudeAb, row);
  return {
    ...rest,
    id: 'ultravioletMagnitude',
    title: 'Ultraviolet magnitude of a bright star-forming galaxy, M*',
    valueText: `M* = ${decimals(magnitudeAb, 2)} AB at ${restWavelengthNm} nm`,
    value: magnitudeAb,
    unit: 'mag AB',
    spreadText: `the knee of the luminosity function, no average: at redshift ${row.redshift}, ${density.toExponential(1)} brighter galaxies per comoving Mpc³, and many more fainter ones`,
  };
}

function ultravioletSlope(redshift: number, magnitudeUv: number, values: TypicalValues): TypicalValue {
  const { source, provenance, lowestRedshift, highestRedshift } = values.ultravioletSlope;
  const slope = typicalUvSlope(magnitudeUv, values);
  return {
    id: 'ultravioletSlope',
    title: 'Ultraviolet slope of a star-forming galaxy',
    valueText: `β = ${decimals(slope, 2)} of f_λ ∝ λ^β at M_UV = ${decimals(magnitudeUv, 1)}`,
    value: slope,
    unit: '',
    spreadText: '0.4 from galaxy to galaxy (common practice)',
    source,
    provenance,
    validText: `Fitted at redshift 7; similar from ${lowestRedshift} to ${highestRedshift}.`,
    isExtrapolated: redshift < lowestRedshift || redshift > highestRedshift,
  };
}

function size(
  relation: SizeRelationId,
  redshift: number,
  absoluteMagnitudeUv: number,
  stellarMassSolar: number,
  values: TypicalValues,
): TypicalValue {
  const row = values.sizes[relation];
  const sizeKpc = typicalSizeKpc(relation, redshift, { absoluteMagnitudeUv, stellarMassSolar }, values);
  const byMass = row.massPower !== undefined;
  const at = byMass
    ? `${stellarMassSolar.toExponential(0)} solar masses`
    : `M_UV = ${decimals(absoluteMagnitudeUv, 1)}`;
  const massText =
    row.lowestMassSolar === undefined ? '' : ` above ${row.lowestMassSolar.toExponential(0)} solar masses`;
  const isTooLight = byMass && row.lowestMassSolar !== undefined && stellarMassSolar < row.lowestMassSolar;
  return {
    id: relation,
    title: row.title,
    valueText: `${decimals(sizeKpc, 2)} kpc ${row.axis}, at ${at}`,
    value: sizeKpc,
    unit: 'kpc',
    spreadText: row.spreadText,
    source: row.source,
    provenance: row.provenance,
    validText: `Redshift ${row.lowestRedshift} to ${row.highestRedshift}${massText}.`,
    isExtrapolated: redshift < row.lowestRedshift || redshift > row.highestRedshift || isTooLight,
  };
}

function sersicIndex(redshift: number, { sizes: { shibuya2015: row } }: TypicalValues): TypicalValue {
  const index = row.sersicIndex!;
  return {
    id: 'sersicIndex',
    title: 'Sérsic index of a star-forming galaxy',
    valueText: `n ≈ ${index}`,
    value: index,
    unit: '',
    spreadText: 'a median; discs have 1',
    source: row.source,
    provenance: row.provenance,
    validText: `Redshift ${row.lowestRedshift} to ${row.highestRedshift}.`,
    isExtrapolated: redshift > row.highestRedshift,
  };
}

function lineWidths({ lineWidths: rows }: TypicalValues): TypicalValue[] {
  return rows.map(({ id, title, velocityWidthKmS, spreadText, provenance }) => ({
    id,
    title,
    valueText: `${velocityWidthKmS} km/s FWHM`,
    value: velocityWidthKmS,
    unit: 'km/s',
    spreadText,
    source: 'common practice',
    provenance,
    validText: 'Used at every redshift.',
    isExtrapolated: false,
  }));
}

function supernova(hubbleConstantKmSMpc: number, values: TypicalValues): TypicalValue {
  const { bandId, spreadText, derivedWith, source, provenance } = values.supernovaIa;
  const magnitude = supernovaIaPeakMagnitude(hubbleConstantKmSMpc, values);
  return {
    id: 'supernovaIaPeak',
    title: 'Type Ia supernova at maximum',
    valueText: `M_${bandId} = ${decimals(magnitude, 2)} Vega for H0 = ${hubbleConstantKmSMpc}`,
    value: magnitude,
    unit: 'mag Vega',
    spreadText,
    source,
    provenance,
    validText: 'Calibrated nearby; no evolution with redshift is assumed.',
    isExtrapolated: false,
    derivedWith: { ...derivedWith, hubbleConstantKmSMpc },
  };
}

function decimals(value: number, digits: number): string {
  return value.toFixed(digits).replace('-', '−');
}
