import { readTypedMagnitude, type TypedMagnitude } from './quantity-magnitude.js';
import { fluxOf, nameOfDimension, readUnit, type TypedFlux } from './quantity-units.js';

/** What a person typed for the light of a source, in one unit per kind. */
export type TypedLight = TypedMagnitude | TypedFlux;

/** Why a text was not read. */
export type LightRefusalCode =
  'empty' | 'notAQuantity' | 'unitMissing' | 'unknownUnit' | 'wrongDimension' | 'notPositive';

/** A refusal in words for whoever typed the text. */
export interface LightRefusal {
  ok: false;
  code: LightRefusalCode;
  message: string;
}
export type TypedLightReading = { ok: true; light: TypedLight } | LightRefusal;

/** Longer than any sensible quantity; keeps a pasted page out of the unit parser. */
const LONGEST_TEXT = 80;
/** A magnitude beyond this is a typing error, not a source. */
const MAGNITUDE_LIMIT = 60;

const NUMBER = String.raw`[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?`;
const BARE_NUMBER = new RegExp(`^${NUMBER}$`);
const STARTS_WITH_NUMBER = new RegExp(`^${NUMBER}`);
/** `SFR = 8 Msun/yr`: the name says nothing that the unit does not. */
const RATE_NAME = /^SFR\s*=\s*/i;

/**
 * Reads the light of a source as typed: `22.5 mag`, `22.1 Vega`, `-21.3 mag absolute`, `M_UV = -21.3`, `12 uJy`,
 * `4e-19 erg/s/cm^2/AA`, `2e-17 erg/s/cm^2`, `1e42 erg/s`, `8 Msun/yr`.
 *
 * Accepts SI prefixes on Jy, W and m, `µ` for `u`, `×10^-17`, and exponents with or without `^`. A plain number is
 * refused, because 25 may be a magnitude or a flux density in some unit. Absolute are a magnitude called so and an upper-case M;
 * everything else is apparent. Without a system, a magnitude is AB. Never throws on any text.
 */
export function readLight(text: string): TypedLightReading {
  const typed = text.trim();
  if (typed === '') return refuse('empty', 'Give a value with its unit, for example 24.3 mag or 2e-17 erg/s/cm^2.');
  if (typed.length > LONGEST_TEXT) return refuse('notAQuantity', `A quantity has at most ${LONGEST_TEXT} characters.`);
  const normal = normalise(typed);
  if (BARE_NUMBER.test(normal)) {
    return refuse('unitMissing', `${typed} has no unit: write mag, uJy, erg/s/cm^2 or erg/s behind it.`);
  }
  const magnitude = readTypedMagnitude(normal);
  if (magnitude !== undefined) return checkedMagnitude(magnitude);
  if (!STARTS_WITH_NUMBER.test(normal)) return refuse('notAQuantity', `${typed} does not begin with a number.`);
  const unit = readUnit(normal);
  if (unit === undefined) return refuse('unknownUnit', `The unit in ${typed} is not known.`);
  const flux = fluxOf(unit, normal);
  if (flux === undefined) return refuse('wrongDimension', wrongDimension(typed, nameOfDimension(unit)));
  const value = numberOf(flux);
  if (!(value > 0 && value < Infinity)) return refuse('notPositive', `${typed} is not a positive amount of light.`);
  return { ok: true, light: flux };
}

function normalise(typed: string): string {
  return (
    typed
      .replace(/[\u00b5\u03bc]/g, 'u')
      .replace(/[\u2212\u2013]/g, '-')
      .replace(/Å/g, 'angstrom')
      .replace(/\b([ML])(?:_?\{?(?:sun|☉|⊙)\}?)/g, '$1sun')
      .replace(/\bsolar mass(?:es)? (?:per|a|\/) ?(?:year|yr)\b/i, 'Msun/yr')
      .replace(RATE_NAME, '')
      .replace(/\s*(?:x|×|\*)\s*10\s*\^?\s*([+-]?\d+)/i, 'e$1')
      .replace(/[·⋅]/g, ' ')
      // cm-2 and s-1, as many journals print them; the look-behind leaves the exponent of 1e-17 alone.
      .replace(/(?<![A-Za-z0-9.^_])([A-Za-z]+)([+-]?\d+)(?!\d|\s*=)/g, '$1^$2')
  );
}

function checkedMagnitude(light: TypedMagnitude): TypedLightReading {
  const value = numberOf(light);
  if (Math.abs(value) > MAGNITUDE_LIMIT) return refuse('notAQuantity', `${value} mag is beyond any source.`);
  return { ok: true, light };
}

/** The number of a light, whatever its kind. */
function numberOf(light: TypedLight): number {
  return Object.values(light).find((each) => typeof each === 'number') ?? NaN;
}

const WANTED = 'a magnitude, a flux density, a line flux, a luminosity or a star-formation rate';

function wrongDimension(typed: string, dimension: string | undefined): string {
  return dimension === undefined
    ? `${typed} is not ${WANTED}.`
    : `${typed} is ${dimension}; light is given as ${WANTED}.`;
}

function refuse(code: LightRefusalCode, message: string): LightRefusal {
  return { ok: false, code, message };
}
