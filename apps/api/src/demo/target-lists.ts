import { designationFromPosition, julianDateFromUnixMs, localSiderealTimeDeg } from '@faintward/astronomy';
import type { Extent, TargetInput } from '@faintward/contracts';
import type { CommentsData, ExtentRecipe, ProposalData, Span, TargetGroupData } from './demo-data.js';
import { demoId } from './identifiers.js';
import { randomStream, type RandomStream, roundTo } from './random.js';
import { lightOf, redshiftOf } from './target-light.js';

export interface DemoTarget extends TargetInput {
  targetId: string;
  proposalKey: string;
  groupIndex: number;
  /** Place in the whole list, from 0. */
  position: number;
}

/** Half the width of the right ascensions that a semester's nights reach well. */
const RIGHT_ASCENSION_REACH_DEG = 80;
const DECLINATIONS: Span = [-62, 4];
/** Closer to the plane of the Milky Way, dust and stars crowd a distant source out. */
const LEAST_GALACTIC_LATITUDE_DEG = 20;
/** Share of targets with a remark beside them. */
const NOTED_SHARE = 0.25;

/** The targets of a proposal, up in the middle of the semester it asks for. */
export function targetsOf(
  proposal: ProposalData,
  semesterMiddle: Date,
  siteLongitudeDegEast: number,
  notes: CommentsData['targetNotes'],
): DemoTarget[] {
  // Apart from the places, so that the hours a proposal asks for do not change with the day.
  const random = randomStream(`targets of ${proposal.key}`);
  const placeRandom = randomStream(`places of ${proposal.key}`);
  const centreDeg = rightAscensionAtMidnightDeg(semesterMiddle, siteLongitudeDegEast);
  const takenNames = new Set<string>();
  const targets: DemoTarget[] = [];
  for (const [groupIndex, group] of proposal.targets.entries()) {
    const places = placesOf(group, centreDeg, placeRandom);
    for (let index = 0; index < group.count; index += 1) {
      let place = places(index);
      let name = nameAt(group.designation, place);
      while (takenNames.has(name)) {
        place = places(index);
        name = nameAt(group.designation, place);
      }
      takenNames.add(name);
      const redshift = redshiftOf(group.redshift, random);
      const light = lightOf(group.light, proposal.key, random);
      const remarks = notes[group.designation] ?? [];
      targets.push({
        targetId: demoId('target', proposal.key, name),
        proposalKey: proposal.key,
        groupIndex,
        position: targets.length,
        name,
        ...place,
        ...redshift,
        light: index >= group.count - (group.withoutLight ?? 0) ? null : light,
        extent: extentOf(group.extent, random),
        notes: remarks.length > 0 && random.next() < NOTED_SHARE ? random.pick(remarks) : '',
      });
    }
  }
  return targets;
}

/** Right ascension that crosses the meridian at the site's midnight. */
function rightAscensionAtMidnightDeg(date: Date, longitudeDegEast: number): number {
  const midnightUtcMs =
    Date.UTC(date.getUTCFullYear(), date.getUTCMonth(), date.getUTCDate()) - (longitudeDegEast / 15) * 3_600_000;
  return localSiderealTimeDeg(julianDateFromUnixMs(midnightUtcMs), longitudeDegEast);
}

interface Place {
  rightAscensionDeg: number;
  declinationDeg: number;
}

function placesOf(group: TargetGroupData, centreDeg: number, random: RandomStream): (index: number) => Place {
  const declinations = group.declinationDeg ?? DECLINATIONS;
  const anywhere = (): Place => {
    for (;;) {
      const place = rounded({
        rightAscensionDeg: centreDeg + random.between(-RIGHT_ASCENSION_REACH_DEG, RIGHT_ASCENSION_REACH_DEG),
        declinationDeg: random.between(...declinations),
      });
      if (Math.abs(galacticLatitudeDeg(place)) >= LEAST_GALACTIC_LATITUDE_DEG) return place;
    }
  };
  const { fields } = group;
  if (fields === undefined) return anywhere;
  const centres = Array.from({ length: fields.count }, anywhere);
  return (index) => {
    const centre = centres[index % centres.length];
    if (centre === undefined) throw new RangeError('A field needs a centre.');
    const radiusDeg = fields.radiusDeg * Math.sqrt(random.next());
    const angle = random.between(0, 2 * Math.PI);
    return rounded({
      rightAscensionDeg:
        centre.rightAscensionDeg + (radiusDeg * Math.sin(angle)) / Math.cos((centre.declinationDeg * Math.PI) / 180),
      declinationDeg: centre.declinationDeg + radiusDeg * Math.cos(angle),
    });
  };
}

function rounded(place: Place): Place {
  return {
    rightAscensionDeg: roundTo(((place.rightAscensionDeg % 360) + 360) % 360, 5) % 360,
    declinationDeg: roundTo(place.declinationDeg, 5),
  };
}

function nameAt(designation: string, place: Place): string {
  return designationFromPosition(
    { raDeg: place.rightAscensionDeg, decDeg: place.declinationDeg },
    { raSecondsDecimals: 1, decSecondsDecimals: 0, acronym: designation },
  );
}

/** Galactic latitude from the north galactic pole of the IAU system, rotated to J2000 (192.859° +27.128°, usual values). */
export function galacticLatitudeDeg(place: Place): number {
  const radians = Math.PI / 180;
  const declination = place.declinationDeg * radians;
  const poleDeclination = 27.12825 * radians;
  const sine =
    Math.sin(declination) * Math.sin(poleDeclination) +
    Math.cos(declination) * Math.cos(poleDeclination) * Math.cos((place.rightAscensionDeg - 192.85948) * radians);
  return Math.asin(sine) / radians;
}

function extentOf(recipe: ExtentRecipe, random: RandomStream): Extent {
  if (recipe.kind !== 'sersic') return { kind: recipe.kind };
  return {
    kind: 'sersic',
    halfLightRadius: roundTo(random.between(...recipe.halfLightRadius), 2),
    unit: recipe.unit,
    sersicIndex: roundTo(random.between(...recipe.sersicIndex), 1),
    axisRatio: roundTo(random.between(...recipe.axisRatio), 2),
  };
}
