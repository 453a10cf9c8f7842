import { OutOfDomainError } from '@faintward/photometry';

/** Refuses a number outside [lowest, highest]; NaN always. */
export function requireBetween(field: string, value: number, lowest: number, highest: number, unit = ''): void {
  if (value >= lowest && value <= highest) return;
  throw new OutOfDomainError(field, value, `between ${lowest} and ${highest}${unit === '' ? '' : ` ${unit}`}`);
}

/** Light of a magnitude in units of magnitude 0. */
export function lightOfMag(magnitude: number): number {
  return 10 ** (-0.4 * magnitude);
}

/** Magnitude of a light in units of magnitude 0; `null` for no light at all, which has no magnitude. */
export function magOfLight(light: number): number | null {
  return light > 0 ? -2.5 * Math.log10(light) : null;
}
