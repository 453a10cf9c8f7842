/** The interval in which an argument is accepted; both ends included unless said otherwise. */
export interface AllowedRange {
  readonly minimum: number;
  readonly maximum: number;
}

/** An argument lies outside the domain of a function. */
export class OutOfDomainError extends Error {
  override readonly name: string = 'OutOfDomainError';

  constructor(
    /** Name of the argument, as in the signature. */
    readonly argument: string,
    readonly value: number,
    readonly allowed: AllowedRange,
    explanation?: string,
  ) {
    super(
      `${argument} must lie between ${allowed.minimum} and ${allowed.maximum}; got ${value}` +
        (explanation === undefined ? '' : ` (${explanation})`),
    );
  }
}

/** In a closed universe the light path reaches the antipode: beyond it the transverse distances fall to zero and turn back. */
export class AntipodeError extends OutOfDomainError {
  override readonly name = 'AntipodeError';

  constructor(redshift: number, antipodeRedshift: number) {
    super(
      'redshift',
      redshift,
      { minimum: 0, maximum: antipodeRedshift },
      'this closed universe has its antipode at the upper end',
    );
  }
}

/** No redshift has the wanted value. */
export class NoSolutionError extends Error {
  override readonly name = 'NoSolutionError';

  constructor(
    /** Name of the quantity that was to be matched. */
    readonly quantity: string,
    readonly value: number,
    /** The values the quantity takes in this model within its redshift limit. */
    readonly attainable: AllowedRange,
  ) {
    super(
      `no redshift has ${quantity} = ${value}; in this model it lies between ${attainable.minimum} and ${attainable.maximum}`,
    );
  }
}

/** A combination of parameters that describes no usable universe. */
export class InvalidCosmologyError extends Error {
  override readonly name: string = 'InvalidCosmologyError';
}

/** The expansion rate squared reaches zero at a finite redshift: such a universe bounced and had no big bang. */
export class NoBigBangError extends InvalidCosmologyError {
  override readonly name = 'NoBigBangError';

  constructor(
    /** Redshift (approximate) at which E² is not positive. */
    readonly redshift: number,
  ) {
    super(
      `these parameters give no big bang: H² is not positive at redshift ${redshift.toPrecision(4)}; lower omegaDarkEnergy or raise omegaMatter`,
    );
  }
}
