import type { Notice } from '@faintward/contracts/common';
import type { Extent, Light } from '@faintward/contracts/light';
import type { TargetComputed } from '@faintward/contracts/targets';
import { type MonthsUp, type MonthsUpPlan, monthsUpWithPlan } from '@faintward/astronomy';
import { type DistanceRow, distanceRows } from '@faintward/cosmology';
import { ENGINE_VERSION, OPAQUE_FOREST_REDSHIFT } from '@faintward/exposure';
import {
  apparentMagnitudeAtRestWavelength,
  arcsecFromKpc,
  BANDS,
  LYMAN_ALPHA_NM,
  LYMAN_LIMIT_NM,
  meanEffectiveSurfaceBrightness,
  redshiftBandwidthMag,
  surfaceBrightnessDimmingMag,
} from '@faintward/photometry';
import { canonicalJson, sha256 } from './canonical-json.js';
import type { ChosenCosmology } from './cosmologies.js';
import { apparentMagnitudeAbOf, lightFaults } from './light.js';
import { mapInSlices } from './slices.js';

/** The part of a target that its columns are computed from. */
export interface TargetInputs {
  rightAscensionDeg: number;
  declinationDeg: number;
  redshift: number;
  light: Light | null;
  extent: Extent;
}

/** Where and when a proposal observes. */
export interface SkyOfSemester {
  startsOn: string;
  endsOn: string;
  plan: MonthsUpPlan;
  zenithSeeingArcsec: number;
}

/** The computed columns of targets, same order. One at a time or thousands at once give the same numbers; thousands give others a turn. */
export async function computeTargetColumns(
  targets: readonly TargetInputs[],
  cosmology: ChosenCosmology,
  sky: SkyOfSemester,
): Promise<TargetComputed[]> {
  const rows = distanceRows(
    cosmology.model,
    targets.map(({ redshift }) => redshift),
  );
  const sharedJson = canonicalJson({
    altitudeLimitDeg: sky.plan.altitudeLimitDeg,
    cosmology: cosmology.parameters,
    endsOn: sky.endsOn,
    site: sky.plan.site,
    startsOn: sky.startsOn,
    usefulHours: sky.plan.usefulHours,
    zenithSeeingArcsec: sky.zenithSeeingArcsec,
  });
  return mapInSlices(targets, (target, index) => {
    const distances = rows[index];
    if (distances === undefined) throw new Error('A batch of distances is shorter than its targets.');
    return columnsOf(target, distances, cosmology, sky, sharedJson);
  });
}

function columnsOf(
  target: TargetInputs,
  distances: DistanceRow,
  cosmology: ChosenCosmology,
  sky: SkyOfSemester,
  sharedJson: string,
): TargetComputed {
  const { redshift, light, extent } = target;
  const magnitudes = magnitudesOf(target, distances);
  const halfLightRadiusArcsec = halfLightRadiusOf(extent, distances.kpcPerArcsec);
  const up = monthsUpWithPlan({ raDeg: target.rightAscensionDeg, decDeg: target.declinationDeg }, sky.plan);
  const inputs = {
    declinationDeg: target.declinationDeg,
    extent,
    light,
    redshift,
    rightAscensionDeg: target.rightAscensionDeg,
  };
  return {
    luminosityDistanceMpc: distances.luminosityDistanceMpc,
    angularDiameterDistanceMpc: distances.angularDiameterDistanceMpc,
    distanceModulusMag: distances.distanceModulusMag ?? null,
    kpcPerArcsec: distances.kpcPerArcsec ?? null,
    ageGyr: distances.ageGyr ?? null,
    lookbackTimeGyr: distances.lookbackTimeGyr,
    perFrequencyDimmingMag: surfaceBrightnessDimmingMag(redshift, 'perUnitFrequency'),
    bolometricDimmingMag: surfaceBrightnessDimmingMag(redshift, 'bolometric'),
    ...magnitudes,
    halfLightRadiusArcsec,
    surfaceBrightnessAbMagPerArcsec2: surfaceBrightnessOf(
      target,
      magnitudes.apparentMagnitudeAb,
      halfLightRadiusArcsec,
    ),
    upSummary: summaryOf(up),
    upHoursByMonth: up.months.map(({ month, hoursUp }) => ({ month, hoursPerNight: hoursUp })),
    notices: noticesOf(target, up, halfLightRadiusArcsec, sky),
    cosmologyId: cosmology.id,
    engineVersion: ENGINE_VERSION,
    inputHash: sha256(`{"shared":${sharedJson},"target":${canonicalJson(inputs)}}`),
  };
}

type Magnitudes = Pick<TargetComputed, 'apparentMagnitudeAb' | 'magnitudeLabel' | 'absoluteMagnitudeAb'>;

/** The brightness of a surface is per square arcsecond, and that of a line no magnitude: both leave these columns empty. */
function magnitudesOf({ light, extent, redshift }: TargetInputs, distances: DistanceRow): Magnitudes {
  const none = { apparentMagnitudeAb: null, magnitudeLabel: null, absoluteMagnitudeAb: null };
  if (light === null || extent.kind === 'uniform') return none;
  const modulus = distances.distanceModulusMag;
  switch (light.kind) {
    case 'apparentMagnitude': {
      const apparentMagnitudeAb = apparentMagnitudeAbOf(light) ?? null;
      const hasDistance = modulus !== undefined && apparentMagnitudeAb !== null;
      return {
        apparentMagnitudeAb,
        magnitudeLabel: light.bandId,
        // At the rest wavelength that is observed in the band, so that no colour enters.
        absoluteMagnitudeAb: hasDistance ? apparentMagnitudeAb - modulus - redshiftBandwidthMag(redshift) : null,
      };
    }
    case 'absoluteMagnitude':
      return {
        apparentMagnitudeAb:
          modulus === undefined ? null : apparentMagnitudeAtRestWavelength(light.magnitudeAb, modulus, redshift),
        magnitudeLabel: modulus === undefined ? null : `at ${Math.round(light.restWavelengthNm * (1 + redshift))} nm`,
        absoluteMagnitudeAb: light.magnitudeAb,
      };
    case 'lineFlux':
    case 'lineLuminosity':
      return none;
  }
}

function halfLightRadiusOf(extent: Extent, kpcPerArcsec: number | undefined): number | null {
  if (extent.kind !== 'sersic') return null;
  if (extent.unit === 'arcsec') return extent.halfLightRadius;
  return kpcPerArcsec === undefined ? null : arcsecFromKpc(extent.halfLightRadius, kpcPerArcsec);
}

function surfaceBrightnessOf(
  { light, extent }: TargetInputs,
  apparentMagnitudeAb: number | null,
  halfLightRadiusArcsec: number | null,
): number | null {
  if (extent.kind === 'uniform') {
    return light?.kind === 'apparentMagnitude' ? (apparentMagnitudeAbOf(light) ?? null) : null;
  }
  if (extent.kind === 'point' || apparentMagnitudeAb === null || halfLightRadiusArcsec === null) return null;
  return meanEffectiveSurfaceBrightness(apparentMagnitudeAb, halfLightRadiusArcsec, extent.axisRatio);
}

const MONTH_NAMES = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

function summaryOf(up: MonthsUp): string {
  switch (up.state) {
    case 'never-up':
      return 'never';
    case 'briefly':
      return 'briefly';
    case 'all-semester':
      return 'all semester';
    case 'some-months':
      return up.usefulSpans
        .map(({ firstMonth, lastMonth }) =>
          firstMonth === lastMonth ? monthName(firstMonth) : `${monthName(firstMonth)}–${monthName(lastMonth)}`,
        )
        .join(', ');
  }
}

function monthName(month: string): string {
  return MONTH_NAMES[Number(month.slice(5, 7)) - 1] ?? month;
}

function noticesOf(
  target: TargetInputs,
  up: MonthsUp,
  halfLightRadiusArcsec: number | null,
  sky: SkyOfSemester,
): Notice[] {
  const { light, redshift } = target;
  const notices: Notice[] = [];
  const warn = (code: string, message: string, field: string, severity: Notice['severity'] = 'warning') =>
    notices.push({ code, message, severity, field });
  if (light === null) {
    warn('noBrightness', 'No brightness yet: nothing can be planned with this target.', 'light');
  } else {
    for (const { path, message } of lightFaults(target)) warn('lightUnusable', message, path, 'error');
  }
  if (light?.kind === 'apparentMagnitude') {
    const isOpaque = redshift >= OPAQUE_FOREST_REDSHIFT.value;
    const edgeNm = (isOpaque ? LYMAN_ALPHA_NM : LYMAN_LIMIT_NM) * (1 + redshift);
    const band = BANDS[light.bandId];
    if (band.wavelengthHighNm <= edgeNm) {
      warn(
        'beyondLymanBreak',
        `At redshift ${redshift} hydrogen absorbs the light short of ${Math.round(edgeNm)} nm, and the ${band.label} band ends at ` +
          `${band.wavelengthHighNm} nm. Is the band or the redshift another one?`,
        'light.bandId',
      );
    }
  }
  if (up.state === 'never-up') {
    warn(
      'neverUp',
      `Never above ${sky.plan.altitudeLimitDeg}° in darkness during the semester; it culminates at ${up.culminationAltitudeDeg.toFixed(0)}°.`,
      'declinationDeg',
    );
  } else if (up.state === 'briefly') {
    warn(
      'brieflyUp',
      `In no month above ${sky.plan.altitudeLimitDeg}° in darkness for ${sky.plan.usefulHours} hours a night.`,
      'rightAscensionDeg',
    );
  }
  if (halfLightRadiusArcsec !== null && 2 * halfLightRadiusArcsec < sky.zenithSeeingArcsec) {
    warn(
      'smallerThanSeeing',
      `Half of its light lies within ${(2 * halfLightRadiusArcsec).toPrecision(2)}″, less than the usual seeing of ${sky.zenithSeeingArcsec}″: it will look like a point.`,
      'extent.halfLightRadius',
      'note',
    );
  }
  return notices;
}
