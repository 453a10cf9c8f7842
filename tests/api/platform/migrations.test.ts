import { cpSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { PGlite } from '@electric-sql/pglite';
import { Estimate, Extent, Light, RedshiftKind, RedshiftUncertainty, TargetComputed } from '@faintward/contracts';
import { drizzle } from 'drizzle-orm/pglite';
import { migrate } from 'drizzle-orm/pglite/migrator';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { z } from 'zod';
import {
  type DatabaseHandle,
  embeddedExtensions,
  embeddedHandle,
  MIGRATIONS_FOLDER,
} from '../../../apps/api/src/database/connection.js';

/** Brightnesses as they were stored before, with what they have to say now. */
const LIGHTS: readonly { old: Record<string, unknown> | null; now: z.input<typeof Light> | null }[] = [
  {
    old: { kind: 'apparentMagnitude', magnitude: 24.1, system: 'Vega', bandId: 'J', spectralSlopeBeta: -1.7 },
    now: {
      kind: 'apparentMagnitude',
      magnitude: 24.1,
      system: 'Vega',
      bandId: 'J',
      spectrum: { kind: 'powerLaw', slopeBeta: -1.7 },
    },
  },
  {
    old: {
      kind: 'absoluteMagnitude',
      magnitudeAb: -21.123456789,
      restWavelengthNm: 160.5,
      spectralSlopeBeta: -2,
      sigmaMag: 0.15,
    },
    now: { kind: 'absoluteMagnitude', magnitude: -21.123456789, restWavelengthNm: 160.5, sigmaMag: 0.15 },
  },
  {
    old: { kind: 'lineFlux', fluxErgSCm2: 2.3e-17, restWavelengthNm: 121.567, velocityWidthKmS: 240, sigmaMag: 0 },
    now: { kind: 'lineFlux', fluxErgSCm2: 2.3e-17, restWavelengthNm: 121.567, velocityWidthKmS: 240, sigmaMag: 0 },
  },
  {
    old: { kind: 'lineLuminosity', luminosityErgS: 1.05e42, restWavelengthNm: 656.46, velocityWidthKmS: 200 },
    now: { kind: 'lineLuminosity', luminosityErgS: 1.05e42, restWavelengthNm: 656.46 },
  },
  { old: null, now: null },
];

const COMPUTED = {
  luminosityDistanceMpc: 70_000,
  angularDiameterDistanceMpc: 1100,
  distanceModulusMag: 49.2,
  kpcPerArcsec: 5.3,
  ageGyr: 0.75,
  lookbackTimeGyr: 13,
  perFrequencyDimmingMag: 6.8,
  bolometricDimmingMag: 9,
  apparentMagnitudeAb: 24.1,
  magnitudeLabel: 'J',
  absoluteMagnitudeAb: -22.8,
  halfLightRadiusArcsec: null,
  surfaceBrightnessAbMagPerArcsec2: null,
  upSummary: 'Oct–Jan',
  upHoursByMonth: [{ month: '2027-10', hoursPerNight: 6 }],
  notices: [],
  cosmologyId: 'planck18',
  engineVersion: '1.0.0',
  inputHash: 'abc',
};

const INFEASIBLE = {
  outcome: 'infeasible',
  engineVersion: '1.0.0',
  inputHash: 'abc',
  cosmologyId: 'planck18',
  steps: [],
  notices: [],
  fwhmArcsec: 0.7,
  wavelengthNm: 1250,
  reason: { code: 'noLight', message: 'No light.' },
  apparentMagnitudeAb: null,
};

const idOf = (index: number) => `00000000-0000-4000-8000-${String(index).padStart(12, '0')}`;

describe('a database from before sources had spectra', () => {
  let handle: DatabaseHandle;

  beforeAll(async () => {
    const client = await PGlite.create({ extensions: await embeddedExtensions() });
    const folder = earlierMigrations(2);
    await migrate(drizzle(client), { migrationsFolder: folder });
    rmSync(folder, { recursive: true });
    // A proposal and a mode without what these in turn hang on.
    await client.exec(`
      set session_replication_role = replica;
      insert into proposals (id, semester_id, number, title) values ('${idOf(100)}', '${idOf(102)}', 1, 'Old');
      insert into modes (id, instrument_id, name) values ('${idOf(101)}', '${idOf(103)}', 'Old');
      set session_replication_role = origin`);
    for (const [index, { old }] of LIGHTS.entries()) {
      await client.query(
        `insert into targets (id, proposal_id, position, name, right_ascension_deg, declination_deg, redshift,
           redshift_sigma, light, extent, computed)
         values ($1, $2, $3, 'Old', 10, -20, 7, $4, $5::jsonb, '{"kind": "point"}', $6::jsonb)`,
        [
          idOf(index),
          idOf(100),
          index,
          [0.02, 0, null, 1.5, null][index],
          old === null ? null : JSON.stringify(old),
          JSON.stringify(COMPUTED),
        ],
      );
      await client.query(
        `insert into observations (id, proposal_id, target_id, mode_id, configuration_version, goal, conditions, estimate)
         values ($1, $2, $3, $4, 1, '{}', '{}', $5::jsonb)`,
        [idOf(index), idOf(100), idOf(index), idOf(101), index === 0 ? JSON.stringify(INFEASIBLE) : null],
      );
    }
    handle = await embeddedHandle(client);
  });
  afterAll(() => handle.close());

  const rows = async (query: string) => (await handle.executeSql(query)).rows;

  it('holds lights that are what the contract makes of them, with every default', async () => {
    const stored = await rows('select light from targets order by position');
    expect(stored.map(({ light }) => light)).toEqual(LIGHTS.map(({ now }) => (now === null ? null : Light.parse(now))));
  });

  it('says how well redshifts are known in the new way, and nothing where nothing was known', async () => {
    const stored = await rows('select redshift_uncertainty, redshift_kind, extent from targets order by position');
    expect(stored.map(({ redshift_uncertainty: uncertainty }) => uncertainty)).toEqual([
      { kind: 'gaussian', sigma: 0.02 },
      null,
      null,
      { kind: 'gaussian', sigma: 1.5 },
      null,
    ]);
    for (const row of stored) {
      RedshiftUncertainty.nullable().parse(row['redshift_uncertainty']);
      expect(RedshiftKind.parse(row['redshift_kind'])).toBe('spectroscopic');
      Extent.parse(row['extent']);
    }
  });

  it('keeps what was computed, and names no reference data for it', async () => {
    for (const { computed } of await rows('select computed from targets')) {
      expect(TargetComputed.parse(computed)).toMatchObject({
        ...COMPUTED,
        bandMagnitudesAb: {},
        lineObservedWavelengthNm: null,
        lineFluxErgSCm2: null,
        referenceDataVersion: 'none',
      });
    }
    const [estimated, ...others] = await rows('select estimate from observations order by id');
    expect(Estimate.parse(estimated?.['estimate'])).toEqual({ ...INFEASIBLE, referenceDataVersion: 'none' });
    expect(others.map(({ estimate }) => estimate)).toEqual([null, null, null, null]);
  });
});

/** A folder with the first so many migrations. */
function earlierMigrations(count: number): string {
  const folder = mkdtempSync(path.join(tmpdir(), 'faintward-migrations-'));
  cpSync(MIGRATIONS_FOLDER, folder, { recursive: true });
  const journalFile = path.join(folder, 'meta/_journal.json');
  const journal = JSON.parse(readFileSync(journalFile, 'utf8')) as { entries: unknown[] };
  writeFileSync(journalFile, JSON.stringify({ ...journal, entries: journal.entries.slice(0, count) }));
  return folder;
}
