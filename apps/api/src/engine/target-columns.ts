import type { Notice } from '@faintward/contracts/common';
import type { FieldError } from '@faintward/contracts/errors';
import type { Extent, Light } from '@faintward/contracts/light';
import type { TargetComputed } from '@faintward/contracts/targets';
import { type MonthsUp, type MonthsUpPlan, monthsUpWithPlan } from '@faintward/astronomy';
import { type DistanceRow, distanceRows } from '@faintward/cosmology';
import { ENGINE_VERSION } from '@faintward/exposure';
import {
  type ArrivingContinuum,
  type ArrivingLight,
  atmosphericRangeAt,
  surfaceBrightnessDimmingMag,
} from '@faintward/photometry';
import { canonicalJson, sha256 } from './canonical-json.js';
import type { ChosenCosmology } from './cosmologies.js';
import { meanSurfaceBrightnessOf, resolveExtent } from './extent.js';
import { apparentMagnitudeAbOf, NO_UPLOADS, type UploadedSpectra } from './light.js';
import { lightFaults } from './light-faults.js';
import { lightData } from './light-data.js';
import { mapInSlices } from './slices.js';
import {
  absoluteMagnitudeAt,
  arrive,
  defaultBandOf,
  GRID_BANDS,
  lightNotices,
  magnitudeIn,
  ultravioletMagnitudeOf,
} from './source.js';

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
  uploaded: UploadedSpectra = NO_UPLOADS,
): Promise<TargetComputed[]> {
  const rows = distanceRows(
    cosmology.model,
    targets.map(({ redshift }) => redshift),
  );
  const sharedJson = canonicalJson({
    altitudeLimitDeg: sky.plan.altitudeLimitDeg,
    cosmology: cosmology.parameters,
    endsOn: sky.endsOn,
    referenceDataVersion: lightData().version,
    site: sky.plan.site,
    startsOn: sky.startsOn,
    usefulHours: sky.plan.usefulHours,
    zenithSeeingArcsec: sky.zenithSeeingArcsec,
  });
  return mapInSlices(targets, (target, index) => {
    const distances = rows[index];
    if (distances === undefined) throw new Error('A batch of distances is shorter than its targets.');
    return columnsOf(target, distances, { cosmology, sky, uploaded, sharedJson });
  });
}

interface Shared {
  cosmology: ChosenCosmology;
  sky: SkyOfSemester;
  uploaded: UploadedSpectra;
  /** What all targets have in common, as hashed. */
  sharedJson: string;
}

function columnsOf(target: TargetInputs, distances: DistanceRow, shared: Shared): TargetComputed {
  const { cosmology, sky, uploaded, sharedJson } = shared;
  const { redshift, light, extent } = target;
  const faults = lightFaults({ ...target, uploaded });
  const arriving =
    light === null || faults.length > 0 ? undefined : arrive(light, extent, { redshift, cosmology, uploaded });
  const magnitudes = magnitudesOf(target, arriving);
  const size = resolveExtent(extent, {
    redshift,
    kpcPerArcsec: distances.kpcPerArcsec,
    magnification: light?.magnification ?? 1,
    absoluteMagnitudeUv: extent.kind === 'typical' && arriving ? ultravioletMagnitudeOf(arriving) : undefined,
  });
  const halfLightRadiusArcsec = size?.halfLightRadiusArcsec ?? null;
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
    ...lineOf(arriving),
    halfLightRadiusArcsec,
    surfaceBrightnessAbMagPerArcsec2: meanSurfaceBrightnessOf(
      extent,
      size,
      // The columns of a surface leave the apparent magnitude empty: what is given is per square arcsecond.
      extent.kind === 'uniform' ? quotedMagnitudeOf(light, arriving) : magnitudes.apparentMagnitudeAb,
    ),
    upSummary: summaryOf(up),
    upHoursByMonth: up.months.map(({ month, hoursUp }) => ({ month, hoursPerNight: hoursUp })),
    notices: noticesOf(target, faults, arriving, up, halfLightRadiusArcsec, sky),
    cosmologyId: cosmology.id,
    engineVersion: ENGINE_VERSION,
    referenceDataVersion: lightData().version,
    inputHash: sha256(`{"shared":${sharedJson},"target":${canonicalJson(inputs)}}`),
  };
}

type Magnitudes = Pick<
  TargetComputed,
  'apparentMagnitudeAb' | 'magnitudeLabel' | 'absoluteMagnitudeAb' | 'bandMagnitudesAb'
>;

/** The brightness of a surface is per square arcsecond, and that of a line no magnitude: both leave these columns empty. */
function magnitudesOf({ light, extent }: TargetInputs, arriving: ArrivingLight | undefined): Magnitudes {
  if (light === null || arriving === undefined || arriving.kind === 'line' || extent.kind === 'uniform') {
    return { apparentMagnitudeAb: null, magnitudeLabel: null, absoluteMagnitudeAb: null, bandMagnitudesAb: {} };
  }
  const { bands } = lightData();
  const bandId = defaultBandOf(light, arriving);
  const apparent = magnitudeIn(arriving, bands[bandId].response);
  const hasMagnitude = typeof apparent === 'number';
  return {
    apparentMagnitudeAb: hasMagnitude ? apparent : null,
    magnitudeLabel: hasMagnitude ? bandId : null,
    absoluteMagnitudeAb: absoluteMagnitudeAt(arriving, quotedRestWavelengthNm(arriving)) ?? null,
    bandMagnitudesAb: Object.fromEntries(
      GRID_BANDS.map((id) => {
        const found = id === bandId ? apparent : magnitudeIn(arriving, bands[id].response);
        return [id, typeof found === 'number' ? found : null];
      }),
    ),
  };
}

/** Where the absolute magnitude is said: as it was given, or at the rest wavelength that is observed in the band. */
function quotedRestWavelengthNm({ light, redshift }: ArrivingContinuum): number {
  const { at, frame } = light;
  const wavelengthNm =
    at.kind === 'response' ? at.response.pivotWavelengthNm : at.kind === 'range' ? NaN : at.wavelengthNm;
  return frame === 'rest' ? wavelengthNm : wavelengthNm / (1 + redshift);
}

function quotedMagnitudeOf(light: Light | null, arriving: ArrivingLight | undefined): number | null {
  if (light?.kind !== 'apparentMagnitude' || arriving === undefined) return null;
  return apparentMagnitudeAbOf(light) ?? null;
}

function lineOf(
  arriving: ArrivingLight | undefined,
): Pick<TargetComputed, 'lineObservedWavelengthNm' | 'lineFluxErgSCm2'> {
  if (arriving?.kind !== 'line') return { lineObservedWavelengthNm: null, lineFluxErgSCm2: null };
  return {
    lineObservedWavelengthNm: arriving.observedWavelengthNm,
    lineFluxErgSCm2: arriving.fluxErgSCm2() ?? null,
  };
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
  faults: readonly FieldError[],
  arriving: ArrivingLight | undefined,
  up: MonthsUp,
  halfLightRadiusArcsec: number | null,
  sky: SkyOfSemester,
): Notice[] {
  const { light } = target;
  const notices: Notice[] = [];
  const warn = (code: string, message: string, field: string, severity: Notice['severity'] = 'warning') =>
    notices.push({ code, message, severity, field });
  if (light === null) {
    warn('noBrightness', 'No brightness yet: nothing can be planned with this target.', 'light');
  } else {
    for (const { path, message } of faults) warn('lightUnusable', message, path, 'error');
    notices.push(...lightNotices(light));
  }
  if (arriving !== undefined) addLightWarnings(arriving, warn);
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

/** What a light meets on its way that a person would want to know while typing the list. */
function addLightWarnings(
  arriving: ArrivingLight,
  warn: (code: string, message: string, field: string, severity?: Notice['severity']) => void,
): void {
  const { atmosphere } = lightData();
  if (arriving.kind === 'line') {
    const nm = arriving.observedWavelengthNm;
    const range = atmosphericRangeAt(atmosphere, nm);
    if (arriving.fluxErgSCm2() === undefined) {
      warn('lineAbsorbed', 'Hydrogen between the galaxies takes all light of this line at this redshift.', 'redshift');
    }
    if (range === undefined) {
      warn('lineOutsideAtmosphere', `The line falls at ${nmText(nm)}, where nothing reaches the ground.`, 'redshift');
    } else if (range.kind === 'gap') {
      warn('lineInGap', `The line falls at ${nmText(nm)}, in a gap of the atmosphere (${range.label}).`, 'redshift');
    }
    return;
  }
  const { at, frame } = arriving.light;
  if (at.kind !== 'response' || frame !== 'observed') return;
  const found = magnitudeIn(arriving, at.response);
  if (typeof found !== 'number') {
    warn('beyondLymanBreak', `${found.message} Is the band or the redshift another one?`, 'light.bandId');
  }
}

function nmText(wavelengthNm: number): string {
  return wavelengthNm < 1000 ? `${wavelengthNm.toFixed(1)} nm` : `${(wavelengthNm / 1000).toFixed(3)} µm`;
}
