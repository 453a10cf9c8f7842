/** An argument lies outside the range for which a function is defined. */
export class ArgumentOutOfRange extends RangeError {
  override readonly name = 'ArgumentOutOfRange';

  constructor(
    readonly argument: string,
    readonly value: number,
    readonly allowed: string,
  ) {
    super(`${argument} is ${value}; allowed: ${allowed}.`);
  }
}

/** @throws {ArgumentOutOfRange} unless lowest ≤ value ≤ highest; NaN is always refused */
export function requireBetween(argument: string, value: number, lowest: number, highest: number): void {
  if (!(value >= lowest && value <= highest)) throw new ArgumentOutOfRange(argument, value, `${lowest} to ${highest}`);
}
