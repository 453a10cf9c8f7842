/** An input lies outside the domain on which a function is defined. Nothing was computed. */
export class OutOfDomainError extends Error {
  override readonly name = 'OutOfDomainError';

  /**
   * @param field    name of the argument, or path of the field in a larger input (`mode.detector.readNoiseElectrons`)
   * @param value    what was given
   * @param allowed  what would have been accepted, in words
   */
  constructor(
    readonly field: string,
    readonly value: unknown,
    readonly allowed: string,
  ) {
    super(`${field} must be ${allowed}; got ${describe(value)}`);
  }
}

function describe(value: unknown): string {
  return typeof value === 'number' ? String(value) : (JSON.stringify(value) ?? String(value));
}

/** @throws {OutOfDomainError} if the value is not positive and finite */
export function requirePositive(field: string, value: number): void {
  if (!(value > 0 && value < Infinity)) throw new OutOfDomainError(field, value, 'a finite number above 0');
}

/** @throws {OutOfDomainError} if the redshift is negative or not finite */
export function requireRedshift(redshift: number): void {
  if (!(redshift >= 0 && redshift < Infinity))
    throw new OutOfDomainError('redshift', redshift, 'a finite number, 0 or more');
}

/** @throws {OutOfDomainError} if the two are not positive, finite and in order */
export function requireOrdered(lowField: string, low: number, highField: string, high: number): void {
  requirePositive(lowField, low);
  if (!(high > low && high < Infinity))
    throw new OutOfDomainError(highField, high, `finite and above ${lowField} = ${low}`);
}
