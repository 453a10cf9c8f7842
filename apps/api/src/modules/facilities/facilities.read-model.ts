import type { ModeConfiguration, Site, Telescope } from '@faintward/contracts/facilities';
import { Injectable } from '@nestjs/common';
import { and, asc, eq, inArray, or, type SQL } from 'drizzle-orm';
import { instruments, modeConfigurations, modes, sites, telescopes } from '../../database/schema/facilities.js';
import { DatabaseService } from '../../database/transaction.js';

export interface SiteDetails extends Site {
  siteId: string;
  observatoryName: string;
}

export interface TelescopeDetails {
  telescopeId: string;
  name: string;
  diameterM: number;
  obstructionDiameterM: number;
  altitudeLowDeg: number;
  altitudeHighDeg: number;
}

/** A mode with one of its configurations, and all that it is mounted on: what an estimate needs to know. */
export interface ModeSetup {
  modeId: string;
  modeName: string;
  instrumentId: string;
  instrumentName: string;
  /** Both the mode and its instrument are offered. */
  isOffered: boolean;
  configurationVersion: number;
  configuration: ModeConfiguration;
  /** The version in force now, which may be newer than the one asked for. */
  versionInForce: number;
  telescope: TelescopeDetails;
  site: SiteDetails;
}

export interface ModeRequest {
  modeId: string;
  /** Without it, the version in force. */
  configurationVersion?: number | undefined;
}

/** What other subjects and the screens read of telescopes and instruments. */
@Injectable()
export class FacilitiesReadModel {
  constructor(private readonly database: DatabaseService) {}

  /** A mode with the configuration in force, or with the named version of it; undefined when there is none. */
  async findMode(modeId: string, configurationVersion?: number): Promise<ModeSetup | undefined> {
    const [setup] = await this.listModes([{ modeId, configurationVersion }]);
    return setup;
  }

  /** Many modes at once, each once; those that do not exist are left out. Keep them apart by `modeId` and `configurationVersion`. */
  async listModes(requests: readonly ModeRequest[]): Promise<ModeSetup[]> {
    if (requests.length === 0) return [];
    const inForce = requests.filter((request) => request.configurationVersion === undefined);
    const named = requests.filter((request) => request.configurationVersion !== undefined);
    const conditions: (SQL | undefined)[] = named.map((request) =>
      and(eq(modes.id, request.modeId), eq(modeConfigurations.version, request.configurationVersion ?? 0)),
    );
    if (inForce.length > 0) {
      conditions.push(
        and(
          inArray(
            modes.id,
            inForce.map((request) => request.modeId),
          ),
          eq(modeConfigurations.version, modes.configurationVersion),
        ),
      );
    }
    return this.selectModes(or(...conditions));
  }

  /** Every mode that proposals may use, with the configuration in force, in the order the observatory shows them. */
  async listOfferedModes(): Promise<ModeSetup[]> {
    return this.selectModes(
      and(
        eq(modes.isOffered, true),
        eq(instruments.isOffered, true),
        eq(modeConfigurations.version, modes.configurationVersion),
      ),
    );
  }

  async findSite(siteId: string): Promise<SiteDetails | undefined> {
    const [site] = await this.database.current().select().from(sites).where(eq(sites.id, siteId));
    return site === undefined ? undefined : toSite(site);
  }

  async listSites(): Promise<SiteDetails[]> {
    return (await this.database.current().select().from(sites).orderBy(asc(sites.name))).map(toSite);
  }

  /** Name and site of each of these telescopes; those that do not exist are left out. */
  async listTelescopeNames(
    telescopeIds: readonly string[],
  ): Promise<{ telescopeId: string; telescopeName: string; siteId: string }[]> {
    if (telescopeIds.length === 0) return [];
    return this.database
      .current()
      .select({ telescopeId: telescopes.id, telescopeName: telescopes.name, siteId: telescopes.siteId })
      .from(telescopes)
      .where(inArray(telescopes.id, [...telescopeIds]))
      .orderBy(asc(telescopes.position), asc(telescopes.name));
  }

  /** Telescopes with their instruments and modes, nested as the screens show them. */
  async listTelescopes(): Promise<Telescope[]> {
    const db = this.database.current();
    const telescopeRows = await db
      .select()
      .from(telescopes)
      .innerJoin(sites, eq(sites.id, telescopes.siteId))
      .orderBy(asc(telescopes.position), asc(telescopes.name));
    const instrumentRows = await db
      .select()
      .from(instruments)
      .orderBy(asc(instruments.position), asc(instruments.name));
    const modeRows = await db
      .select({ mode: modes, configuration: modeConfigurations })
      .from(modes)
      .innerJoin(
        modeConfigurations,
        and(eq(modeConfigurations.modeId, modes.id), eq(modeConfigurations.version, modes.configurationVersion)),
      )
      .orderBy(asc(modes.position), asc(modes.name));
    return telescopeRows.map(({ telescopes: telescope, sites: site }) => ({
      ...toTelescope(telescope),
      site: toSite(site),
      instruments: instrumentRows
        .filter((instrument) => instrument.telescopeId === telescope.id)
        .map((instrument) => ({
          instrumentId: instrument.id,
          name: instrument.name,
          description: instrument.description,
          isOffered: instrument.isOffered,
          modes: modeRows
            .filter(({ mode }) => mode.instrumentId === instrument.id)
            .map(({ mode, configuration }) => ({
              modeId: mode.id,
              name: mode.name,
              isOffered: mode.isOffered,
              configurationVersion: configuration.version,
              inForceSince: configuration.createdAt.toISOString(),
              configuration: configuration.configuration,
            })),
        })),
    }));
  }

  private async selectModes(condition: SQL | undefined): Promise<ModeSetup[]> {
    const rows = await this.database
      .current()
      .select({
        mode: modes,
        instrument: instruments,
        telescope: telescopes,
        site: sites,
        configuration: modeConfigurations,
      })
      .from(modes)
      .innerJoin(instruments, eq(instruments.id, modes.instrumentId))
      .innerJoin(telescopes, eq(telescopes.id, instruments.telescopeId))
      .innerJoin(sites, eq(sites.id, telescopes.siteId))
      .innerJoin(modeConfigurations, eq(modeConfigurations.modeId, modes.id))
      .where(condition)
      .orderBy(
        asc(telescopes.position),
        asc(telescopes.name),
        asc(instruments.position),
        asc(instruments.name),
        asc(modes.position),
        asc(modes.name),
        asc(modeConfigurations.version),
      );
    return rows.map(({ mode, instrument, telescope, site, configuration }) => ({
      modeId: mode.id,
      modeName: mode.name,
      instrumentId: instrument.id,
      instrumentName: instrument.name,
      isOffered: mode.isOffered && instrument.isOffered,
      configurationVersion: configuration.version,
      configuration: configuration.configuration,
      versionInForce: mode.configurationVersion,
      telescope: toTelescope(telescope),
      site: toSite(site),
    }));
  }
}

function toSite(site: typeof sites.$inferSelect): SiteDetails {
  return {
    siteId: site.id,
    observatoryName: site.observatoryName,
    name: site.name,
    latitudeDeg: site.latitudeDeg,
    longitudeDegEast: site.longitudeDegEast,
    elevationM: site.elevationM,
    timeZone: site.timeZone,
    zenithSeeingArcsec: site.zenithSeeingArcsec,
    outerScaleM: site.outerScaleM,
  };
}

function toTelescope(telescope: typeof telescopes.$inferSelect): TelescopeDetails {
  return {
    telescopeId: telescope.id,
    name: telescope.name,
    diameterM: telescope.diameterM,
    obstructionDiameterM: telescope.obstructionDiameterM,
    altitudeLowDeg: telescope.altitudeLowDeg,
    altitudeHighDeg: telescope.altitudeHighDeg,
  };
}
