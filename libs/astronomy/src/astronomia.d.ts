// Types of the parts of astronomia 4.2 that are used here; the package ships none. Angles are radians unless a comment says otherwise.

declare module 'astronomia/sidereal' {
  /** Mean sidereal time at Greenwich, in seconds of time, 0 to 86,400. Argument: Julian date, UT1. */
  export function mean(jd: number): number;
  /** Apparent sidereal time at Greenwich, in seconds of time. Argument: Julian date, UT1. */
  export function apparent(jd: number): number;
}

declare module 'astronomia/solar' {
  /** Apparent right ascension and declination of the Sun. Argument: Julian ephemeris date (TT). */
  export function apparentEquatorial(jde: number): { readonly ra: number; readonly dec: number };
}

declare module 'astronomia/precess' {
  export class Precessor {
    /** Both epochs in Julian years. */
    constructor(epochFrom: number, epochTo: number);
    /** The three precession angles of the pair of epochs; theta as sine and cosine. */
    readonly ζ: number;
    readonly z: number;
    readonly sθ: number;
    readonly cθ: number;
  }
}
