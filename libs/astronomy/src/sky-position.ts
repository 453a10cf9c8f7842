/** A place on the sky: ICRS (J2000) unless said otherwise, both coordinates in degrees. */
export interface SkyPosition {
  /** 0 ≤ raDeg < 360. */
  readonly raDeg: number;
  /** −90 ≤ decDeg ≤ 90. */
  readonly decDeg: number;
}

const radiansPerDegree = Math.PI / 180;

export function toRadians(degrees: number): number {
  return degrees * radiansPerDegree;
}

export function toDegrees(radians: number): number {
  return radians / radiansPerDegree;
}

/** The same direction in [0, 360). */
export function normaliseDegrees(degrees: number): number {
  const turned = degrees % 360;
  const positive = turned < 0 ? turned + 360 : turned;
  // A negative number closer to zero than the spacing of doubles near 360 would come out as 360 itself.
  return positive >= 360 || positive === 0 ? 0 : positive;
}
