import { create, createUnitDependencies, unitDependencies, type Unit } from 'mathjs';

/**
 * Only the unit parser of mathjs is created, not its expression evaluator: what a person types is read, never run.
 * The instance is private to this file, so the units added here are seen nowhere else.
 */
// The collections are declared optional only for the sake of index access; both exist in every build of mathjs.
const math = create({ unitDependencies: unitDependencies!, createUnitDependencies: createUnitDependencies! });

math.createUnit('Jy', { definition: '1e-26 W/m^2/Hz', prefixes: 'short', aliases: ['jansky'] });
// IAU 2015 Resolution B3, nominal solar luminosity.
math.createUnit('Lsun', { definition: '3.828e26 W' });
// Only masses per year are read, so that the digits cancel.
math.createUnit('Msun', { definition: '1.988e30 kg' });
math.createUnit('yr', { definition: '1 year', prefixes: 'short' });
math.createUnit('AA', { definition: '1 angstrom', aliases: ['Angstrom', 'Ang'] });
math.createUnit('micron', { definition: '1e-6 m' });

/** A number with its unit, or undefined where the unit is not known. */
export function readUnit(normal: string): Unit | undefined {
  try {
    return math.unit(normal);
  } catch (error) {
    // The parser reports an unknown unit or a misplaced character by SyntaxError; anything else is a bug of ours.
    if (error instanceof SyntaxError) return undefined;
    throw error;
  }
}

const DIMENSIONS: readonly (readonly [string, Unit])[] = [
  ['a length', '1 m'],
  ['an area', '1 m^2'],
  ['a time', '1 s'],
  ['a frequency', '1 Hz'],
  ['a velocity', '1 m/s'],
  ['a mass', '1 kg'],
  ['a mass per time', '1 kg/s'],
  ['a temperature', '1 K'],
  ['an angle', '1 rad'],
  ['an energy', '1 J'],
  ['an energy per time and frequency', '1 W/Hz'],
  ['an energy per area', '1 J/m^2'],
  [
    'a surface brightness: give the total, or choose an even surface and its magnitude per square arcsecond',
    '1 Jy/rad^2',
  ],
  ['a surface brightness of a line: give the total flux', '1 W/m^2/rad^2'],
].map(([name, unit]) => [name!, math.unit(unit!)] as const);

/** What a quantity is, in words, where it has a usual name. */
export function nameOfDimension(unit: Unit): string | undefined {
  return DIMENSIONS.find(([, reference]) => unit.equalBase(reference))?.[0];
}

const LINE_FLUX = math.unit('1 erg/s/cm^2');
const LUMINOSITY = math.unit('1 erg/s');
const FLUX_DENSITY = math.unit('1 Jy');
const FLUX_PER_ANGSTROM = math.unit('1 erg/s/cm^2/angstrom');
const MASS_PER_TIME = math.unit('1 Msun/yr');

/** A quantity of light by its dimension. */
export type TypedFlux =
  | { kind: 'fluxDensityJy'; fluxDensityJy: number }
  | { kind: 'fluxPerAngstrom'; fluxErgSCm2Angstrom: number }
  | { kind: 'lineFluxErgSCm2'; lineFluxErgSCm2: number }
  | { kind: 'lineLuminosityErgS'; lineLuminosityErgS: number }
  | { kind: 'starFormationRate'; solarMassesPerYear: number };

/** The light that a quantity is, or undefined for another dimension. */
export function fluxOf(unit: Unit, normal: string): TypedFlux | undefined {
  const is = (reference: Unit): boolean => unit.equalBase(reference);
  // Energy per area has the dimension of a flux density too; only a text that names Jy or Hz is taken for one.
  if (is(FLUX_DENSITY) && /Jy|jansky|Hz|hertz/i.test(normal)) {
    return { kind: 'fluxDensityJy', fluxDensityJy: unit.toNumber('Jy') };
  }
  if (is(LINE_FLUX)) return { kind: 'lineFluxErgSCm2', lineFluxErgSCm2: unit.toNumber('erg/s/cm^2') };
  if (is(LUMINOSITY)) return { kind: 'lineLuminosityErgS', lineLuminosityErgS: unit.toNumber('erg/s') };
  if (is(FLUX_PER_ANGSTROM)) {
    return { kind: 'fluxPerAngstrom', fluxErgSCm2Angstrom: unit.toNumber('erg/s/cm^2/angstrom') };
  }
  // Kilograms per second are nobody's star formation.
  if (is(MASS_PER_TIME) && /Msun/.test(normal)) {
    return { kind: 'starFormationRate', solarMassesPerYear: unit.toNumber('Msun/yr') };
  }
  return undefined;
}
