/** An argument lies outside the domain on which a numerical routine is defined. */
export class NumericalDomainError extends Error {
  override readonly name = 'NumericalDomainError';

  constructor(
    readonly argument: string,
    readonly value: number,
    readonly allowed: string,
  ) {
    super(`${argument} must be ${allowed}; got ${value}`);
  }
}

/** The function has the same sign at both ends of the interval, so no root is enclosed. */
export class RootNotBracketedError extends Error {
  override readonly name = 'RootNotBracketedError';

  constructor(
    readonly lower: number,
    readonly upper: number,
    readonly valueAtLower: number,
    readonly valueAtUpper: number,
  ) {
    super(`no change of sign on [${lower}, ${upper}]: f = ${valueAtLower} and ${valueAtUpper}`);
  }
}

/** An iteration used up its steps without reaching its tolerance; no last guess is handed out. */
export class NotConvergedError extends Error {
  override readonly name = 'NotConvergedError';

  constructor(
    readonly routine: string,
    readonly iterations: number,
    detail: string,
  ) {
    super(`${routine} did not converge in ${iterations} iterations: ${detail}`);
  }
}
