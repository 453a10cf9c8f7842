import { create, createUnitDependencies, unitDependencies, type Unit } from 'mathjs';

/** What a person typed for the light of a target, in one unit per kind. */
export type ParsedLight =
  | { kind: 'abMagnitude'; magnitudeAb: number }
  | { kind: 'fluxDensityJy'; fluxDensityJy: number }
  | { kind: 'fluxPerAngstrom'; fluxErgSCm2Angstrom: number }
  | { kind: 'lineFluxErgSCm2'; lineFluxErgSCm2: number }
  | { kind: 'lineLuminosityErgS'; lineLuminosityErgS: number };

export type LightRefusalCode =
  'empty' | 'notAQuantity' | 'unitMissing' | 'unknownUnit' | 'wrongDimension' | 'notPositive';

export type LightParsing = { ok: true; light: ParsedLight } | { ok: false; code: LightRefusalCode; message: string };

/** Longer than any sensible quantity; keeps a pasted page out of the unit parser. */
const LONGEST_TEXT = 80;
/** A magnitude beyond this is a typing error, not a source. */
const MAGNITUDE_LIMIT = 60;

/**
 * Only the unit parser of mathjs is created, not its expression evaluator: what a person types is read, never run.
 * The instance is private to this file, so the units added here are seen nowhere else.
 */
// The collections are declared optional only for the sake of index access; both exist in every build of mathjs.
const math = create({ unitDependencies: unitDependencies!, createUnitDependencies: createUnitDependencies! });

math.createUnit('Jy', { definition: '1e-26 W/m^2/Hz', prefixes: 'short', aliases: ['jansky'] });
// IAU 2015 Resolution B3, nominal solar luminosity.
math.createUnit('Lsun', { definition: '3.828e26 W' });
math.createUnit('AA', { definition: '1 angstrom', aliases: ['Angstrom', 'Ang'] });

const NUMBER = String.raw`[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?`;
const BARE_NUMBER = new RegExp(`^${NUMBER}$`);
const MAGNITUDE = new RegExp(`^(${NUMBER})\\s*(?:mag|mags|ab|abmag|mag\\s*\\(?ab\\)?|ab\\s*mag)$`, 'i');
const VEGA_MAGNITUDE = /vega/i;
const STARTS_WITH_NUMBER = new RegExp(`^${NUMBER}`);

/**
 * Reads the light of a target as typed: `22.5 mag`, `12 uJy`, `2e-17 erg/s/cm^2`, `1e42 erg/s`, `3.1e-18 W m-2`.
 *
 * Accepts SI prefixes on Jy, W and m, `µ` for `u`, `×10^-17`, and exponents with or without `^`. A plain number is
 * refused, because 25 may be a magnitude or a flux density in some unit. Never throws on any text.
 */
export function parseLight(text: string): LightParsing {
  const typed = text.trim();
  if (typed === '') return refuse('empty', 'Give a value with its unit, for example 24.3 mag or 2e-17 erg/s/cm^2.');
  if (typed.length > LONGEST_TEXT) return refuse('notAQuantity', `A quantity has at most ${LONGEST_TEXT} characters.`);
  const normal = normalise(typed);
  if (BARE_NUMBER.test(normal)) {
    return refuse('unitMissing', `${typed} has no unit: write mag, uJy, erg/s/cm^2 or erg/s behind it.`);
  }
  if (VEGA_MAGNITUDE.test(normal)) {
    return refuse('unknownUnit', 'Vega magnitudes depend on the band: convert to AB with the band first.');
  }
  const magnitude = MAGNITUDE.exec(normal);
  if (magnitude) return readMagnitude(Number(magnitude[1]));
  if (!STARTS_WITH_NUMBER.test(normal)) return refuse('notAQuantity', `${typed} does not begin with a number.`);
  const unit = readUnit(normal);
  if (unit === undefined) return refuse('unknownUnit', `The unit in ${typed} is not known.`);
  return classify(unit, normal, typed);
}

function normalise(typed: string): string {
  return (
    typed
      .replace(/[\u00b5\u03bc]/g, 'u')
      .replace(/[\u2212\u2013]/g, '-')
      .replace(/Å/g, 'angstrom')
      .replace(/\s*(?:x|×|\*)\s*10\s*\^?\s*([+-]?\d+)/i, 'e$1')
      .replace(/[·⋅]/g, ' ')
      // cm-2 and s-1, as many journals print them; the look-behind leaves the exponent of 1e-17 alone.
      .replace(/(?<![A-Za-z0-9.^])([A-Za-z]+)([+-]?\d+)/g, '$1^$2')
  );
}

function readMagnitude(magnitudeAb: number): LightParsing {
  if (Math.abs(magnitudeAb) > MAGNITUDE_LIMIT) {
    return refuse('notAQuantity', `${magnitudeAb} mag is beyond any source.`);
  }
  return { ok: true, light: { kind: 'abMagnitude', magnitudeAb } };
}

function readUnit(normal: string): Unit | undefined {
  try {
    return math.unit(normal);
  } catch (error) {
    // The parser reports an unknown unit or a misplaced character by SyntaxError; anything else is a bug of ours.
    if (error instanceof SyntaxError) return undefined;
    throw error;
  }
}

const LINE_FLUX = math.unit('1 erg/s/cm^2');
const LUMINOSITY = math.unit('1 erg/s');
const FLUX_DENSITY = math.unit('1 Jy');
const FLUX_PER_ANGSTROM = math.unit('1 erg/s/cm^2/angstrom');

function classify(unit: Unit, normal: string, typed: string): LightParsing {
  const is = (reference: Unit): boolean => unit.equalBase(reference);
  const light = is(FLUX_DENSITY)
    ? readFluxDensity(unit, normal)
    : is(LINE_FLUX)
      ? ({ kind: 'lineFluxErgSCm2', lineFluxErgSCm2: unit.toNumber('erg/s/cm^2') } as const)
      : is(LUMINOSITY)
        ? ({ kind: 'lineLuminosityErgS', lineLuminosityErgS: unit.toNumber('erg/s') } as const)
        : is(FLUX_PER_ANGSTROM)
          ? ({ kind: 'fluxPerAngstrom', fluxErgSCm2Angstrom: unit.toNumber('erg/s/cm^2/angstrom') } as const)
          : undefined;
  if (light === undefined) {
    return refuse('wrongDimension', `${typed} is neither a magnitude, a flux density, a line flux nor a luminosity.`);
  }
  const value = Object.values(light).find((each) => typeof each === 'number') ?? NaN;
  if (!(value > 0 && value < Infinity)) return refuse('notPositive', `${typed} is not a positive amount of light.`);
  return { ok: true, light };
}

/** Energy per area has the dimension of a flux density too; only a text that names Jy or Hz is taken for one. */
function readFluxDensity(unit: Unit, normal: string): ParsedLight | undefined {
  if (!/Jy|jansky|Hz|hertz/i.test(normal)) return undefined;
  return { kind: 'fluxDensityJy', fluxDensityJy: unit.toNumber('Jy') };
}

function refuse(code: LightRefusalCode, message: string): LightParsing {
  return { ok: false, code, message };
}
