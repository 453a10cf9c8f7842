import { BAND_IDS, type BandId } from './bands.js';

/** A magnitude as typed, apparent or absolute. */
export type TypedMagnitude =
  | { kind: 'abMagnitude'; magnitudeAb: number }
  /** Its AB magnitude depends on the band, which the caller knows. */
  | { kind: 'vegaMagnitude'; magnitudeVega: number }
  | {
      kind: 'absoluteMagnitude';
      magnitude: number;
      system: 'AB' | 'Vega';
      /** Where the text says it (`M_UV`, `M_1450`); rest frame. */
      restWavelengthNm: number | null;
      /** Where the text says it (`M_B`); rest frame. */
      restBandId: BandId | null;
    };

const NUMBER = String.raw`[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?`;
const SYSTEM = String.raw`\(?(?<system>[Aa][Bb]|[Vv][Ee][Gg][Aa])\)?`;
const ABSOLUTE_WORD = String.raw`abs(?:olute)?\.?`;

/** Words behind the number, in any order that people use: `22.5 mag AB`, `22.1 Vega`, `-21.3 mag (absolute)`. */
const NUMBER_FIRST = new RegExp(`^(?<value>${NUMBER})\\s*(?<words>[a-z().\\s]+)$`, 'i');
const MAGNITUDE_WORDS = new Set(['mag', 'mags', 'magnitude', 'magnitudes']);
const SYSTEM_WORDS: Readonly<Record<string, 'AB' | 'Vega'>> = { ab: 'AB', abmag: 'AB', vega: 'Vega', vegamag: 'Vega' };
const ABSOLUTE_WORDS = new Set(['abs', 'absolute']);

/** `m = 22.5`, `m_AB = 22.5`; `M = -21.3`, `M_UV = -21.3`, `M1450 = -26.5`, `M_B = -19.3 Vega`. Upper case is absolute. */
const NAME_FIRST = new RegExp(
  `^(?<name>[mM])_?\\{?(?<index>[A-Za-z]{0,4}|\\d{3,5})\\}?(?:\\([A-Za-z]+\\))?\\s*=\\s*(?<value>${NUMBER})\\s*(?:mags?)?\\s*(?:${SYSTEM})?\\s*(?:mags?)?$`,
);
const WORDS_FIRST = new RegExp(
  `^${ABSOLUTE_WORD}\\s*(?:mag(?:nitude)?)?\\s*[=:]?\\s*(?<value>${NUMBER})\\s*(?:mags?)?\\s*(?:${SYSTEM})?$`,
  'i',
);

/** What M_UV usually means. */
const ULTRAVIOLET_NM = 150;
const NM_PER_ANGSTROM = 0.1;

/** The magnitude of a text, or undefined if it is none. */
export function readTypedMagnitude(normal: string): TypedMagnitude | undefined {
  return numberFirst(normal) ?? nameFirst(normal) ?? absoluteWordsFirst(normal);
}

function numberFirst(normal: string): TypedMagnitude | undefined {
  const { value, words } = NUMBER_FIRST.exec(normal)?.groups ?? {};
  let isAbsolute = false;
  const systems = new Set<'AB' | 'Vega'>();
  for (const word of words?.toLowerCase().match(/[a-z]+/g) ?? []) {
    const system = SYSTEM_WORDS[word];
    if (system !== undefined) systems.add(system);
    else if (ABSOLUTE_WORDS.has(word)) isAbsolute = true;
    else if (!MAGNITUDE_WORDS.has(word)) return undefined;
  }
  // AB and Vega at once is no magnitude.
  if (value === undefined || systems.size > 1) return undefined;
  return magnitude(Number(value), [...systems][0], isAbsolute, null, null);
}

function nameFirst(normal: string): TypedMagnitude | undefined {
  const { name, index = '', value, system } = NAME_FIRST.exec(normal)?.groups ?? {};
  if (value === undefined) return undefined;
  const isSystem = /^(ab|vega)$/i.test(index);
  if (name === 'm')
    return index === '' || isSystem ? magnitude(Number(value), system ?? index, false, null, null) : undefined;
  if (index === '' || isSystem) return magnitude(Number(value), system ?? index, true, null, null);
  if (/^\d+$/.test(index)) return magnitude(Number(value), system, true, Number(index) * NM_PER_ANGSTROM, null);
  if (/^uv$/i.test(index)) return magnitude(Number(value), system, true, ULTRAVIOLET_NM, null);
  const bandId = BAND_IDS.find((id) => id === (index === 'K' ? 'Ks' : index));
  return bandId === undefined ? undefined : magnitude(Number(value), system, true, null, bandId);
}

function absoluteWordsFirst(normal: string): TypedMagnitude | undefined {
  const { value, system } = WORDS_FIRST.exec(normal)?.groups ?? {};
  return value === undefined ? undefined : magnitude(Number(value), system, true, null, null);
}

function magnitude(
  value: number,
  systemText: string | undefined,
  isAbsolute: boolean,
  restWavelengthNm: number | null,
  restBandId: BandId | null,
): TypedMagnitude {
  const system = systemText?.toLowerCase() === 'vega' ? 'Vega' : 'AB';
  if (isAbsolute) return { kind: 'absoluteMagnitude', magnitude: value, system, restWavelengthNm, restBandId };
  return system === 'AB'
    ? { kind: 'abMagnitude', magnitudeAb: value }
    : { kind: 'vegaMagnitude', magnitudeVega: value };
}
