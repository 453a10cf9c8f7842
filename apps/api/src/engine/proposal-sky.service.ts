import { planMonthsUp } from '@faintward/astronomy';
import { Injectable } from '@nestjs/common';
import { FacilitiesReadModel } from '../modules/facilities/facilities.read-model.js';
import { SemestersReadModel } from '../modules/semesters/semesters.read-model.js';
import type { SkyOfSemester } from './target-columns.js';

/** A target counts as up above this altitude, where the airmass is 2 (common practice). */
const ALTITUDE_LIMIT_DEG = 30;
const DAY_MS = 86_400_000;
const KEPT_COUNT = 32;

/** The nights that a semester's targets are judged against. */
@Injectable()
export class ProposalSkies {
  private readonly kept = new Map<string, SkyOfSemester>();

  constructor(
    private readonly semesters: SemestersReadModel,
    private readonly facilities: FacilitiesReadModel,
  ) {}

  async ofSemester(semesterId: string): Promise<SkyOfSemester> {
    const semester = await this.semesters.get(semesterId);
    const site = await this.facilities.findSite(semester.siteId);
    if (site === undefined) throw new Error(`Semester ${semesterId} has no site.`);
    const { startsOn, endsOn } = semester;
    const { latitudeDeg, longitudeDegEast, zenithSeeingArcsec } = site;
    // The Sun of a whole semester takes long enough to compute that a cell edit should not wait for it.
    const key = [startsOn, endsOn, latitudeDeg, longitudeDegEast, zenithSeeingArcsec].join(' ');
    const known = this.kept.get(key);
    if (known !== undefined) return known;
    const localNoonShiftMs = (0.5 - longitudeDegEast / 360) * DAY_MS;
    const plan = planMonthsUp(
      { latitudeDeg, longitudeDegEast },
      {
        altitudeLimitDeg: ALTITUDE_LIMIT_DEG,
        // Around the local noons of the first and the last evening, a quarter of a day clear of rounding.
        startUtc: new Date(Date.parse(`${startsOn}T00:00:00Z`) + localNoonShiftMs - DAY_MS / 4),
        endUtc: new Date(Date.parse(`${endsOn}T00:00:00Z`) + localNoonShiftMs + DAY_MS / 4),
      },
    );
    const sky = { startsOn, endsOn, plan, zenithSeeingArcsec };
    for (const oldest of this.kept.keys()) {
      if (this.kept.size < KEPT_COUNT) break;
      this.kept.delete(oldest);
    }
    this.kept.set(key, sky);
    return sky;
  }
}
