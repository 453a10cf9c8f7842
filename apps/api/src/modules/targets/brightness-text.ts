import {
  type BandId,
  BandId as BandIdSchema,
  type Light,
  Light as LightSchema,
  type MagnitudeSystem,
} from '@faintward/contracts/light';
import { abMagnitudeFromFluxDensityJy, abMagnitudeFromFluxPerAngstrom, LYMAN_ALPHA_NM } from '@faintward/photometry';
import { parseLight } from '@faintward/photometry/quantity';
import { normaliseMinus } from '@faintward/tables';
import { apparentMagnitudeAbOf, bandWavelengthNm } from '../../engine/light.js';

/** What a text may leave unsaid. */
export interface BrightnessDefaults {
  /** The light that the text replaces: its band, line and slope are kept where the text names no other. */
  present: Light | null;
  /** Band of a magnitude or flux density whose band nothing tells. */
  bandId: BandId;
  /** System of a bare number. */
  system: MagnitudeSystem;
}

export type BrightnessParsing = { ok: true; light: Light | null; warning?: string } | { ok: false; message: string };

const NUMBER = String.raw`[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?`;
const BANDS = String.raw`U|B|V|R|I|u|g|r|i|z|Y|J|H|Ks|K`;
/** `24.1`, `24.1 mag`, `24.1 AB`, `24.1 J`, `24.10 AB (J)`, `23.2 Vega J`. Bands keep their case: r and R are two. */
const MAGNITUDE = new RegExp(
  String.raw`^(?<value>${NUMBER})\s*(?<mag>[Mm][Aa][Gg][Ss]?)?\s*\(?(?<system>AB|ab|Ab|[Vv][Ee][Gg][Aa])?\)?\s*(?:[Mm][Aa][Gg][Ss]?)?\s*(?:\(?\s*(?<band>${BANDS})(?:[\s-]*band)?\s*\)?)?$`,
);
/** `M -21.5`, `M = -21.5 AB (150 nm)`. */
const ABSOLUTE = new RegExp(
  String.raw`^M\s*=?\s*(?<value>${NUMBER})\s*(?:mag)?\s*(?:AB)?\s*(?:(?:\(|at|@)\s*(?<nm>${NUMBER})\s*nm\s*\)?)?$`,
);
/** What stands behind a line's flux or luminosity: the rest wavelength of the line. */
const REST_WAVELENGTH = new RegExp(String.raw`^(?<rest>.*?)\s*(?:\(|\bat\b|@)\s*(?<nm>${NUMBER})\s*nm\s*\)?$`);
const IN_BAND = new RegExp(String.raw`^(?<rest>.*?)\s*\(\s*(?<band>${BANDS})\s*\)$`);

const EXAMPLES = '24.1 AB (J), 23.2 Vega (J), 12 uJy, M -21.5 (150 nm), 2e-17 erg/s/cm^2 (121.567 nm) or 1e42 erg/s';

/**
 * Reads a brightness as typed into a cell; every text that {@link formatBrightness} writes comes back as it was. Empty is no
 * brightness. A bare number is a magnitude in the band of the light it replaces.
 */
export function parseBrightness(typed: string, defaults: BrightnessDefaults): BrightnessParsing {
  const text = normaliseMinus(typed).trim();
  if (text === '') return { ok: true, light: null };
  if (text.length > 120) return refuse('A brightness has at most 120 characters.');
  const { present } = defaults;
  const presentBand = present?.kind === 'apparentMagnitude' ? present.bandId : undefined;
  const slope =
    present !== null && 'spectralSlopeBeta' in present ? { spectralSlopeBeta: present.spectralSlopeBeta } : {};

  const magnitude = MAGNITUDE.exec(text)?.groups;
  if (magnitude !== undefined) {
    const { value, mag, system, band } = magnitude;
    if (present?.kind === 'absoluteMagnitude' && mag === undefined && system === undefined && band === undefined) {
      return refuse(
        `"${shorten(typed)}" may be an apparent or an absolute magnitude: write M ${value} for an absolute, ${value} AB (V) for an apparent one.`,
      );
    }
    const isNamed = system !== undefined || mag !== undefined;
    return checked({
      kind: 'apparentMagnitude',
      magnitude: Number(value),
      system: system === undefined ? (isNamed ? 'AB' : defaults.system) : /^vega$/i.test(system) ? 'Vega' : 'AB',
      bandId: toBand(band) ?? presentBand ?? defaults.bandId,
      ...slope,
    });
  }
  const absolute = ABSOLUTE.exec(text)?.groups;
  if (absolute !== undefined) {
    const rest = absolute['nm'] ?? (present?.kind === 'absoluteMagnitude' ? present.restWavelengthNm : undefined);
    return checked({
      kind: 'absoluteMagnitude',
      magnitudeAb: Number(absolute['value']),
      ...(rest === undefined ? {} : { restWavelengthNm: Number(rest) }),
      ...slope,
    });
  }
  return parseFlux(text, typed, defaults, presentBand, slope);
}

function parseFlux(
  text: string,
  typed: string,
  { present, bandId }: BrightnessDefaults,
  presentBand: BandId | undefined,
  slope: object,
): BrightnessParsing {
  const atWavelength = REST_WAVELENGTH.exec(text)?.groups;
  const inBand = IN_BAND.exec(text)?.groups;
  const quantity = parseLight(atWavelength?.['rest'] ?? inBand?.['rest'] ?? text);
  if (!quantity.ok) return refuse(`${quantity.message} Write it like ${EXAMPLES}.`);
  const band = toBand(inBand?.['band']) ?? presentBand ?? bandId;
  const apparent = (magnitudeAb: number) =>
    checked({
      kind: 'apparentMagnitude',
      // A millionth of a magnitude is far below what is ever known; more digits would only fill the cell.
      magnitude: Number(magnitudeAb.toFixed(6)),
      system: 'AB',
      bandId: band,
      ...slope,
    });
  const { light } = quantity;
  switch (light.kind) {
    case 'abMagnitude':
      return apparent(light.magnitudeAb);
    case 'fluxDensityJy':
      return apparent(abMagnitudeFromFluxDensityJy(light.fluxDensityJy));
    case 'fluxPerAngstrom':
      return apparent(abMagnitudeFromFluxPerAngstrom(light.fluxErgSCm2Angstrom, bandWavelengthNm(band)));
    case 'lineFluxErgSCm2':
    case 'lineLuminosityErgS': {
      if (inBand !== undefined) {
        return refuse(`"${shorten(typed)}" is the light of a line, which has a rest wavelength instead of a band.`);
      }
      const line = present?.kind === 'lineFlux' || present?.kind === 'lineLuminosity' ? present : undefined;
      const givenNm = atWavelength?.['nm'];
      const restWavelengthNm = givenNm === undefined ? (line?.restWavelengthNm ?? LYMAN_ALPHA_NM) : Number(givenNm);
      const basics = { restWavelengthNm, ...(line === undefined ? {} : { velocityWidthKmS: line.velocityWidthKmS }) };
      const parsed = checked(
        light.kind === 'lineFluxErgSCm2'
          ? { kind: 'lineFlux', fluxErgSCm2: asTyped(light.lineFluxErgSCm2), ...basics }
          : { kind: 'lineLuminosity', luminosityErgS: asTyped(light.lineLuminosityErgS), ...basics },
      );
      if (!parsed.ok || givenNm !== undefined || line !== undefined) return parsed;
      return {
        ...parsed,
        warning: `Taken as Lyα, ${LYMAN_ALPHA_NM} nm at rest. For another line write its rest wavelength behind: (656.46 nm).`,
      };
    }
  }
}

/** Without the rounding that converting units leaves in the last digits: nobody types sixteen of them. */
function asTyped(value: number): number {
  return Number(value.toPrecision(14));
}

/** The contract's own limits, so that a cell accepts what a form accepts. */
function checked(light: unknown): BrightnessParsing {
  const parsed = LightSchema.safeParse(light);
  if (!parsed.success) {
    const [issue] = parsed.error.issues;
    return refuse(`Out of range (${issue?.path.join('.') ?? ''}): ${issue?.message ?? ''}. Write it like ${EXAMPLES}.`);
  }
  if (parsed.data.kind === 'apparentMagnitude' && apparentMagnitudeAbOf(parsed.data) === undefined) {
    return refuse(`The ${parsed.data.bandId} band is only used with AB magnitudes; give the AB magnitude.`);
  }
  return { ok: true, light: parsed.data };
}

function toBand(text: string | undefined): BandId | undefined {
  if (text === undefined) return undefined;
  return text === 'K' ? 'Ks' : BandIdSchema.parse(text);
}

function refuse(message: string): BrightnessParsing {
  return { ok: false, message };
}

function shorten(text: string): string {
  return text.length > 40 ? `${text.slice(0, 39)}…` : text;
}

/** A brightness as the grid shows and takes it, with all its digits: "24.10 AB (J)". */
export function formatBrightness(light: Light | null): string {
  if (light === null) return '';
  switch (light.kind) {
    case 'apparentMagnitude':
      return `${atLeastTwoDecimals(light.magnitude)} ${light.system} (${light.bandId})`;
    case 'absoluteMagnitude':
      return `M ${atLeastTwoDecimals(light.magnitudeAb)} (${light.restWavelengthNm} nm)`;
    case 'lineFlux':
      return `${light.fluxErgSCm2} erg/s/cm^2 (${light.restWavelengthNm} nm)`;
    case 'lineLuminosity':
      return `${light.luminosityErgS.toExponential()} erg/s (${light.restWavelengthNm} nm)`;
  }
}

function atLeastTwoDecimals(value: number): string {
  const text = String(value);
  return /e|\.\d\d/.test(text) ? text : value.toFixed(2);
}
