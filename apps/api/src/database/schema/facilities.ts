import type { ModeConfiguration } from '@faintward/contracts';
import { boolean, doublePrecision, integer, jsonb, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { createdAt, primaryId } from './columns.js';
import { people } from './people.js';

export const sites = pgTable('sites', {
  id: primaryId(),
  observatoryName: text('observatory_name').notNull(),
  name: text('name').notNull(),
  latitudeDeg: doublePrecision('latitude_deg').notNull(),
  longitudeDegEast: doublePrecision('longitude_deg_east').notNull(),
  elevationM: doublePrecision('elevation_m').notNull(),
  timeZone: text('time_zone').notNull(),
  zenithSeeingArcsec: doublePrecision('zenith_seeing_arcsec').notNull(),
  outerScaleM: doublePrecision('outer_scale_m'),
});

export const telescopes = pgTable('telescopes', {
  id: primaryId(),
  siteId: uuid('site_id')
    .notNull()
    .references(() => sites.id),
  name: text('name').notNull().unique(),
  diameterM: doublePrecision('diameter_m').notNull(),
  obstructionDiameterM: doublePrecision('obstruction_diameter_m').notNull(),
  altitudeLowDeg: doublePrecision('altitude_low_deg').notNull(),
  altitudeHighDeg: doublePrecision('altitude_high_deg').notNull(),
  position: integer('position').notNull().default(0),
});

export const instruments = pgTable('instruments', {
  id: primaryId(),
  telescopeId: uuid('telescope_id')
    .notNull()
    .references(() => telescopes.id),
  name: text('name').notNull().unique(),
  description: text('description').notNull(),
  isOffered: boolean('is_offered').notNull().default(true),
  position: integer('position').notNull().default(0),
});

export const modes = pgTable(
  'modes',
  {
    id: primaryId(),
    instrumentId: uuid('instrument_id')
      .notNull()
      .references(() => instruments.id),
    name: text('name').notNull(),
    isOffered: boolean('is_offered').notNull().default(true),
    position: integer('position').notNull().default(0),
    /** Which of its configurations is in force. */
    configurationVersion: integer('configuration_version').notNull().default(1),
  },
  (table) => [unique('modes_name_unique').on(table.instrumentId, table.name)],
);

/** Never changed once written: stored results name the version they used. */
export const modeConfigurations = pgTable(
  'mode_configurations',
  {
    id: primaryId(),
    modeId: uuid('mode_id')
      .notNull()
      .references(() => modes.id),
    version: integer('version').notNull(),
    configuration: jsonb('configuration').$type<ModeConfiguration>().notNull(),
    note: text('note').notNull().default(''),
    createdBy: uuid('created_by').references(() => people.id),
    createdAt: createdAt(),
  },
  (table) => [unique('mode_configurations_version_unique').on(table.modeId, table.version)],
);
