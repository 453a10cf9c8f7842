import { angularSeparationArcsec, toRadians } from '@faintward/astronomy';

/** Two targets nearer than this are taken for the same source. */
export const DUPLICATE_RADIUS_ARCSEC = 2;

const MOST_IN_CUBE = 64;

interface NamedPlace {
  name: string;
  rightAscensionDeg: number;
  declinationDeg: number;
}

/** Edge of the cubes that directions are sorted into: the chord of the radius, so that a neighbour is at most one cube away. */
const CUBE_EDGE = 2 * Math.sin(toRadians(DUPLICATE_RADIUS_ARCSEC / 3600) / 2);

/**
 * Places with names, asked whether one of the same name lies within 2″. Each question looks into 27 cubes of space whatever
 * the arrangement, so that a list of thousands of equal rows takes no longer than any other.
 */
export class NamedPlaces {
  private readonly cubes = new Map<string, NamedPlace[]>();

  add(place: NamedPlace): void {
    const key = keyOf(place, cubeOf(place));
    const known = this.cubes.get(key);
    if (known === undefined) this.cubes.set(key, [place]);
    // Sixty targets of one name within some arcseconds are no target list; without an end, one made for the purpose could keep
    // the server busy for minutes.
    else if (known.length < MOST_IN_CUBE) known.push(place);
  }

  has(place: NamedPlace): boolean {
    const [x, y, z] = cubeOf(place);
    for (let dx = -1; dx <= 1; dx += 1) {
      for (let dy = -1; dy <= 1; dy += 1) {
        for (let dz = -1; dz <= 1; dz += 1) {
          const others = this.cubes.get(keyOf(place, [x + dx, y + dy, z + dz]));
          if (others?.some((other) => isNear(place, other)) === true) return true;
        }
      }
    }
    return false;
  }
}

type Cube = readonly [number, number, number];

function cubeOf({ rightAscensionDeg, declinationDeg }: NamedPlace): Cube {
  const ra = toRadians(rightAscensionDeg);
  const dec = toRadians(declinationDeg);
  const cube = (coordinate: number) => Math.floor(coordinate / CUBE_EDGE);
  return [cube(Math.cos(dec) * Math.cos(ra)), cube(Math.cos(dec) * Math.sin(ra)), cube(Math.sin(dec))];
}

function keyOf({ name }: NamedPlace, [x, y, z]: Cube): string {
  return `${x} ${y} ${z} ${name.replace(/\s+/g, ' ').trim().toLowerCase()}`;
}

function isNear(a: NamedPlace, b: NamedPlace): boolean {
  const separation = angularSeparationArcsec(
    { raDeg: a.rightAscensionDeg, decDeg: a.declinationDeg },
    { raDeg: b.rightAscensionDeg, decDeg: b.declinationDeg },
  );
  return separation <= DUPLICATE_RADIUS_ARCSEC;
}
