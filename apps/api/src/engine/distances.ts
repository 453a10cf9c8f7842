import { setImmediate as nextTurn } from 'node:timers/promises';
import type { Notice } from '@faintward/contracts/common';
import type { DistanceRow, DistancesRequest, DistancesResponse } from '@faintward/contracts/distances';
import type { FieldError } from '@faintward/contracts/errors';
import {
  AntipodeError,
  cosmologyWarnings,
  type DistanceRow as EngineRow,
  distanceRows,
  MAX_REDSHIFT,
  redshiftWarnings,
} from '@faintward/cosmology';
import { ENGINE_VERSION } from '@faintward/exposure';
import { surfaceBrightnessDimmingMag } from '@faintward/photometry';
import { validationFailed } from '../platform/validation.js';
import { chooseCosmology } from './cosmologies.js';

/** A few milliseconds of computing. */
const BATCH_ROWS = 1000;

/**
 * Distances, times, scale, volume and dimming of many redshifts, in their order.
 *
 * @throws {DomainError} `validation-failed`, naming each redshift and each parameter that cannot be used
 */
export async function computeDistances({ cosmology: choice, redshifts }: DistancesRequest): Promise<DistancesResponse> {
  const cosmology = chooseCosmology(choice);
  const faults = redshiftFaults(redshifts);
  if (faults.length > 0) throw validationFailed(faults);
  const rows: DistanceRow[] = [];
  try {
    for (let start = 0; start < redshifts.length; start += BATCH_ROWS) {
      // A hundred thousand rows at once would keep every other request waiting.
      if (start > 0) await nextTurn();
      rows.push(...distanceRows(cosmology.model, redshifts.slice(start, start + BATCH_ROWS)).map(toDistanceRow));
    }
  } catch (error) {
    if (error instanceof AntipodeError) throw beyondAntipode(redshifts, error.allowed.maximum);
    throw error;
  }
  const notices: Notice[] = cosmologyWarnings(cosmology.model.parameters).map(toNotice);
  // One for the largest redshift: a hundred thousand of the same would hide the others.
  const largest = redshifts.reduce((most, redshift) => Math.max(most, redshift), 0);
  notices.push(...redshiftWarnings(largest).map(toNotice));
  if (rows.some((row) => row.ageGyr === null)) {
    notices.push({
      code: 'no-beginning',
      message: 'This universe has no beginning: its age has no value.',
      severity: 'warning',
    });
  }
  return {
    cosmology: { id: cosmology.id, title: cosmology.title, source: cosmology.source },
    engineVersion: ENGINE_VERSION,
    notices,
    rows,
  };
}

function toNotice({ code, message }: { code: string; message: string }): Notice {
  return { code, message, severity: 'warning' };
}

function redshiftFaults(redshifts: readonly number[]): FieldError[] {
  return redshifts.flatMap((redshift, index) => {
    if (redshift >= 0 && redshift <= MAX_REDSHIFT) return [];
    const message =
      redshift < 0
        ? `A redshift below 0 (a blueshift) has no distance; ${redshift} was given.`
        : `Redshifts up to ${MAX_REDSHIFT} are computed; ${redshift} was given.`;
    return [{ path: `redshifts.${index}`, message }];
  });
}

function beyondAntipode(redshifts: readonly number[], antipodeRedshift: number) {
  const message =
    `This closed universe has its antipode at redshift ${antipodeRedshift.toPrecision(6)}; ` +
    'at and beyond it transverse distances have no value.';
  return validationFailed(
    redshifts.flatMap((redshift, index) =>
      redshift >= antipodeRedshift ? [{ path: `redshifts.${index}`, message }] : [],
    ),
  );
}

export function toDistanceRow(row: EngineRow): DistanceRow {
  return {
    redshift: row.redshift,
    comovingDistanceMpc: row.comovingDistanceMpc,
    transverseComovingDistanceMpc: row.transverseComovingDistanceMpc,
    angularDiameterDistanceMpc: row.angularDiameterDistanceMpc,
    luminosityDistanceMpc: row.luminosityDistanceMpc,
    distanceModulusMag: row.distanceModulusMag ?? null,
    // At no distance an arcsecond spans nothing; the library leaves it out because the inverse has no value.
    kpcPerArcsec: row.kpcPerArcsec ?? 0,
    comovingVolumeMpc3: row.comovingVolumeMpc3,
    lookbackTimeGyr: row.lookbackTimeGyr,
    ageGyr: row.ageGyr ?? null,
    hubbleKmSMpc: row.hubbleKmSMpc,
    criticalDensityGCm3: row.criticalDensityGCm3,
    bolometricDimmingMag: surfaceBrightnessDimmingMag(row.redshift, 'bolometric'),
    perFrequencyDimmingMag: surfaceBrightnessDimmingMag(row.redshift, 'perUnitFrequency'),
    perWavelengthDimmingMag: surfaceBrightnessDimmingMag(row.redshift, 'perUnitWavelength'),
    photonRateDimmingMag: surfaceBrightnessDimmingMag(row.redshift, 'photonRate'),
  };
}
