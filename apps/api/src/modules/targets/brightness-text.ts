import {
  type BandId,
  BandId as BandIdSchema,
  type Light,
  Light as LightSchema,
  type MagnitudeSystem,
} from '@faintward/contracts/light';
import { abMagnitudeFromFluxDensityJy, abMagnitudeFromFluxPerAngstrom, LYMAN_ALPHA_NM } from '@faintward/photometry';
import { readLight } from '@faintward/photometry/quantity';
import { normaliseMinus } from '@faintward/tables';
import { apparentMagnitudeAbOf, bandWavelengthNm } from '../../engine/light.js';
import { formatBrightness } from './brightness-format.js';

/** What a text may leave unsaid. */
export interface BrightnessDefaults {
  /** The light that the text replaces: what the text does not say stays as it is there. */
  present: Light | null;
  /** Band of a magnitude or flux density whose band nothing tells. */
  bandId: BandId;
  /** System of a bare number. */
  system: MagnitudeSystem;
}

export type BrightnessParsing = { ok: true; light: Light | null; warning?: string } | { ok: false; message: string };

type Said<Kind extends Light['kind']> = { kind: Kind } & Partial<Extract<Light, { kind: Kind }>>;

const NUMBER = String.raw`[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?`;
const BANDS = String.raw`U|B|V|R|I|u|g|r|i|z|Y|J|H|Ks|K`;
const SYSTEM = String.raw`(?:AB|ab|Ab|[Vv][Ee][Gg][Aa])`;
/** `24.1`, `24.1 mag`, `24.1 AB`, `24.1 J`, `24.10 AB (J)`, `23.2 Vega J`. Bands keep their case: r and R are two. */
const MAGNITUDE = new RegExp(
  String.raw`^(?<value>${NUMBER})\s*(?<mag>[Mm][Aa][Gg][Ss]?)?\s*\(?(?<system>${SYSTEM})?\)?\s*(?:[Mm][Aa][Gg][Ss]?)?\s*(?:\(?\s*(?<band>${BANDS})(?:[\s-]*band)?\s*\)?)?$`,
);
/** `M -21.5`, `M = -21.5 AB (150 nm)`, `M_UV -21.5`, `M -21.3 Vega (B)`, `M_B = -19.3 Vega`. */
const ABSOLUTE = new RegExp(
  String.raw`^M(?:_?(?<uv>UV)|_(?<bandBefore>${BANDS}))?\s*=?\s*(?<value>${NUMBER})\s*(?:mag)?\s*(?<system>${SYSTEM})?\s*(?:(?:\(|at|@)\s*(?:(?<nm>${NUMBER})\s*nm|(?<band>${BANDS}))\s*\)?)?$`,
);
/** In the unit that is stored, so that every digit is kept. */
const LINE_FLUX = new RegExp(String.raw`^(?<value>${NUMBER})\s*erg\/s\/cm\^2$`);
const LINE_LUMINOSITY = new RegExp(String.raw`^(?<value>${NUMBER})\s*erg\/s$`);
const STAR_FORMATION = new RegExp(
  String.raw`^(?:SFR\s*=?\s*)?(?<value>${NUMBER})\s*(?:M_?sun|M☉|M⊙|solar masses)\s*(?:\/\s*(?:yr|year|a)|\s(?:yr|year|a)\^?-1|per year)\s*(?:\(?\s*(?:(?<uv>UV)|(?<ha>H[αa]|H-alpha)|(?<lya>Ly[αa]|Ly-alpha))\s*\)?)?$`,
  'i',
);
const TYPICAL = /^typical\s*(?:(?<galaxy>(?:star-forming\s+)?galaxy)|(?<supernova>(?:supernova|SN)\s*(?:Ia)?))$/i;
/** What stands behind a line's flux or luminosity: the rest wavelength of the line. */
const REST_WAVELENGTH = new RegExp(String.raw`^(?<rest>.*?)\s*(?:\(|\bat\b|@)\s*(?<nm>${NUMBER})\s*nm\s*\)?$`);
const IN_BAND = new RegExp(String.raw`^(?<rest>.*?)\s*\(\s*(?<band>${BANDS})\s*\)$`);

const ULTRAVIOLET_NM = 150;
const EXAMPLES =
  '24.1 AB (J), 23.2 Vega (J), 12 uJy, M -21.5 (150 nm), M -21.3 Vega (B), 2e-17 erg/s/cm^2 (121.567 nm), 1e42 erg/s, ' +
  '8 Msun/yr or typical galaxy';

/**
 * Reads a brightness as typed into a cell; every text that {@link formatBrightness} writes comes back as it was. Empty is no
 * brightness. A bare number is a magnitude in the band of the light it replaces. What a cell cannot say (spectrum, dust, lensing)
 * is kept from the light it replaces.
 */
export function parseBrightness(typed: string, defaults: BrightnessDefaults): BrightnessParsing {
  const text = normaliseMinus(typed).trim();
  const { present } = defaults;
  if (text === '') return { ok: true, light: null };
  if (present !== null && text === formatBrightness(present)) return { ok: true, light: present };
  if (text.length > 120) return refuse('A brightness has at most 120 characters.');
  return (
    parseApparent(text, typed, defaults) ??
    parseAbsolute(text, present) ??
    parseStarFormation(text, present) ??
    parseTypical(text, present) ??
    parseFlux(text, typed, defaults)
  );
}

function parseApparent(text: string, typed: string, defaults: BrightnessDefaults): BrightnessParsing | undefined {
  const { present } = defaults;
  const magnitude = MAGNITUDE.exec(text)?.groups;
  if (magnitude === undefined) return undefined;
  const { value, mag, system, band } = magnitude;
  if (mag === undefined && system === undefined && band === undefined) {
    if (present?.kind === 'absoluteMagnitude') {
      return refuse(
        `"${shorten(typed)}" may be an apparent or an absolute magnitude: write M ${value} for an absolute, ${value} AB (V) for an apparent one.`,
      );
    }
    if (present?.kind === 'starFormationRate') {
      return refuse(
        `"${shorten(typed)}" may be a star-formation rate or a magnitude: write ${value} Msun/yr or ${value} AB (V).`,
      );
    }
  }
  const isNamed = system !== undefined || mag !== undefined;
  return checked(present, {
    kind: 'apparentMagnitude',
    magnitude: Number(value),
    system: toSystem(system) ?? (isNamed ? 'AB' : defaults.system),
    bandId: toBand(band) ?? bandOf(defaults),
  });
}

function parseAbsolute(text: string, present: Light | null): BrightnessParsing | undefined {
  const absolute = ABSOLUTE.exec(text)?.groups;
  if (absolute === undefined) return undefined;
  const nm = absolute['nm'] ?? (absolute['uv'] === undefined ? undefined : String(ULTRAVIOLET_NM));
  return absoluteMagnitude(
    present,
    Number(absolute['value']),
    toSystem(absolute['system']),
    nm === undefined ? null : Number(nm),
    toBand(absolute['band'] ?? absolute['bandBefore']) ?? null,
  );
}

/** Where the text does not say at which wavelength or in which band, it is where it was. */
function absoluteMagnitude(
  present: Light | null,
  magnitude: number,
  system: MagnitudeSystem | undefined,
  restWavelengthNm: number | null,
  restBandId: BandId | null,
): BrightnessParsing {
  const before = present?.kind === 'absoluteMagnitude' ? present : undefined;
  const saysWhere = restBandId !== null || restWavelengthNm !== null;
  return checked(present, {
    kind: 'absoluteMagnitude',
    magnitude,
    system: system ?? (saysWhere ? 'AB' : (before?.system ?? 'AB')),
    restWavelengthNm: restWavelengthNm ?? before?.restWavelengthNm ?? ULTRAVIOLET_NM,
    restBandId: saysWhere ? restBandId : (before?.restBandId ?? null),
  });
}

function parseStarFormation(text: string, present: Light | null): BrightnessParsing | undefined {
  const rate = STAR_FORMATION.exec(text)?.groups;
  if (rate === undefined) return undefined;
  const { value, uv, ha, lya } = rate;
  const tracer =
    uv !== undefined
      ? 'ultraviolet'
      : ha !== undefined
        ? 'hydrogenAlpha'
        : lya !== undefined
          ? 'lymanAlpha'
          : undefined;
  return starFormationRate(present, Number(value), tracer);
}

function starFormationRate(
  present: Light | null,
  solarMassesPerYear: number,
  tracer?: Extract<Light, { kind: 'starFormationRate' }>['tracer'],
): BrightnessParsing {
  const before = present?.kind === 'starFormationRate' ? present.tracer : 'ultraviolet';
  return checked(present, { kind: 'starFormationRate', solarMassesPerYear, tracer: tracer ?? before });
}

function parseTypical(text: string, present: Light | null): BrightnessParsing | undefined {
  const typical = TYPICAL.exec(text)?.groups;
  if (typical === undefined) return undefined;
  if (typical['galaxy'] !== undefined) return checked(present, { kind: 'typical', of: 'starFormingGalaxy' });
  const spectrum = present !== null && 'spectrum' in present ? present.spectrum : undefined;
  return checked(present, {
    kind: 'typical',
    of: 'supernovaIa',
    // A supernova of a galaxy's colours would be no supernova.
    spectrum: spectrum?.kind === 'supernovaIa' ? spectrum : { kind: 'supernovaIa', phaseDays: 0 },
  });
}

function parseFlux(text: string, typed: string, defaults: BrightnessDefaults): BrightnessParsing {
  const { present } = defaults;
  const atWavelength = REST_WAVELENGTH.exec(text)?.groups;
  const inBand = IN_BAND.exec(text)?.groups;
  const rest = atWavelength?.['rest'] ?? inBand?.['rest'] ?? text;
  const band = toBand(inBand?.['band']) ?? bandOf(defaults);
  const lightOfLine = (said: Said<'lineFlux'> | Said<'lineLuminosity'>) =>
    inBand === undefined
      ? parseLine(said, atWavelength?.['nm'], present)
      : refuse(`"${shorten(typed)}" is the light of a line, which has a rest wavelength instead of a band.`);

  const flux = LINE_FLUX.exec(rest)?.groups?.['value'];
  if (flux !== undefined && Number(flux) > 0) return lightOfLine({ kind: 'lineFlux', fluxErgSCm2: Number(flux) });
  const luminosity = LINE_LUMINOSITY.exec(rest)?.groups?.['value'];
  if (luminosity !== undefined && Number(luminosity) > 0) {
    return lightOfLine({ kind: 'lineLuminosity', luminosityErgS: Number(luminosity) });
  }
  const quantity = readLight(rest);
  if (!quantity.ok) return refuse(`${quantity.message} Write it like ${EXAMPLES}.`);
  const apparent = (magnitude: number, system: MagnitudeSystem = 'AB') =>
    checked(present, {
      kind: 'apparentMagnitude',
      // A millionth of a magnitude is far below what is ever known; more digits would only fill the cell.
      magnitude: Number(magnitude.toFixed(6)),
      system,
      bandId: band,
    });
  const { light } = quantity;
  switch (light.kind) {
    case 'abMagnitude':
      return apparent(light.magnitudeAb);
    case 'vegaMagnitude':
      return apparent(light.magnitudeVega, 'Vega');
    case 'absoluteMagnitude': {
      const { magnitude, system, restWavelengthNm, restBandId } = light;
      return absoluteMagnitude(present, magnitude, system, restWavelengthNm, restBandId);
    }
    case 'starFormationRate':
      return starFormationRate(present, asTyped(light.solarMassesPerYear));
    case 'fluxDensityJy':
      return apparent(abMagnitudeFromFluxDensityJy(light.fluxDensityJy));
    case 'fluxPerAngstrom':
      return apparent(abMagnitudeFromFluxPerAngstrom(light.fluxErgSCm2Angstrom, bandWavelengthNm(band)));
    case 'lineFluxErgSCm2':
      return lightOfLine({ kind: 'lineFlux', fluxErgSCm2: asTyped(light.lineFluxErgSCm2) });
    case 'lineLuminosityErgS':
      return lightOfLine({ kind: 'lineLuminosity', luminosityErgS: asTyped(light.lineLuminosityErgS) });
  }
}

function parseLine(
  said: Said<'lineFlux'> | Said<'lineLuminosity'>,
  givenNm: string | undefined,
  present: Light | null,
): BrightnessParsing {
  const line = present?.kind === 'lineFlux' || present?.kind === 'lineLuminosity' ? present : undefined;
  const restWavelengthNm = givenNm === undefined ? (line?.restWavelengthNm ?? LYMAN_ALPHA_NM) : Number(givenNm);
  const parsed = checked(present, { ...said, restWavelengthNm });
  if (!parsed.ok || givenNm !== undefined || line !== undefined) return parsed;
  return {
    ...parsed,
    warning: `Taken as Lyα, ${LYMAN_ALPHA_NM} nm at rest. For another line write its rest wavelength behind: (656.46 nm).`,
  };
}

/** Without the rounding that converting units leaves in the last digits: nobody types sixteen of them. */
function asTyped(value: number): number {
  return Number(value.toPrecision(14));
}

/**
 * What a text said, over what the present light says beside it; within the contract's own limits, so that a cell accepts what a
 * form accepts. A light of another kind is another measurement: its uncertainty and what it contained do not go over.
 */
function checked(
  present: Light | null,
  said: { [Kind in Light['kind']]: Said<Kind> }[Light['kind']],
): BrightnessParsing {
  const isSameKind = present?.kind === said.kind;
  const { includes, sigmaMag, ...kept } = present ?? {};
  const parsed = LightSchema.safeParse({ ...kept, ...(isSameKind ? { includes, sigmaMag } : {}), ...said });
  if (!parsed.success) {
    const [issue] = parsed.error.issues;
    return refuse(`Out of range (${issue?.path.join('.') ?? ''}): ${issue?.message ?? ''}. Write it like ${EXAMPLES}.`);
  }
  if (parsed.data.kind === 'apparentMagnitude' && apparentMagnitudeAbOf(parsed.data) === undefined) {
    return refuse(`The ${parsed.data.bandId} band is only used with AB magnitudes; give the AB magnitude.`);
  }
  return { ok: true, light: parsed.data };
}

function bandOf({ present, bandId }: BrightnessDefaults): BandId {
  return present?.kind === 'apparentMagnitude' ? present.bandId : bandId;
}

function toBand(text: string | undefined): BandId | undefined {
  if (text === undefined) return undefined;
  return text === 'K' ? 'Ks' : BandIdSchema.parse(text);
}

function toSystem(text: string | undefined): MagnitudeSystem | undefined {
  if (text === undefined) return undefined;
  return /^vega$/i.test(text) ? 'Vega' : 'AB';
}

function refuse(message: string): BrightnessParsing {
  return { ok: false, message };
}

function shorten(text: string): string {
  return text.length > 40 ? `${text.slice(0, 39)}…` : text;
}
