import { z } from 'zod';
import { Id, Instant, ListQuery, Version, pageOf } from './common.js';
import { Conditions, Estimate, Goal } from './estimates.js';
import { HoursByMoonClass, MoonClass } from './semesters.js';
import { MAX_TARGET_COUNT } from './targets.js';

/** A target with a setup, a goal and wanted conditions, and what the engine makes of them. */
export const Observation = z
  .object({
    observationId: Id,
    targetId: Id,
    targetName: z.string(),
    redshift: z.number(),
    modeId: Id,
    modeName: z.string(),
    instrumentName: z.string(),
    telescopeName: z.string(),
    configurationVersion: z.int(),
    goal: Goal,
    conditions: Conditions,
    /** How often the whole is done; an epoch repeats exposures and overheads. */
    repeatCount: z.int(),
    /** Null while the target says nothing about its light. */
    estimate: Estimate.nullable(),
    /** Overheads and repeats included; null without a feasible estimate. */
    totalSeconds: z.number().nullable(),
    /** Why there is no estimate: the target has no brightness yet. */
    lacking: z.string().nullable(),
    version: Version,
    updatedAt: Instant,
  })
  .meta({ id: 'Observation' });
export type Observation = z.infer<typeof Observation>;
export const ObservationPage = pageOf(Observation).meta({ id: 'ObservationPage' });
export const ObservationListQuery = ListQuery.extend({
  sort: z.enum(['position', 'targetName', 'redshift', 'modeName', 'totalSeconds']).default('position'),
  targetId: Id.optional(),
});
export type ObservationListQuery = z.output<typeof ObservationListQuery>;

const plan = {
  modeId: Id,
  goal: Goal,
  conditions: Conditions,
  repeatCount: z.int().min(1).max(200).default(1),
};

/** The same setup, goal and conditions for many targets at once. */
export const ApplySetup = z
  .object({
    ...plan,
    /** Every target of the proposal, or those named. */
    targetIds: z.union([z.literal('all'), z.array(Id).min(1).max(MAX_TARGET_COUNT)]),
    /** Observations that a target already has with this mode are replaced instead of added to. */
    replaceSameMode: z.boolean().default(true),
  })
  .meta({ id: 'ApplySetup' });
export type ApplySetup = z.output<typeof ApplySetup>;
export const ApplySetupResult = z
  .object({
    createdCount: z.int(),
    replacedCount: z.int(),
    feasibleCount: z.int(),
    infeasibleCount: z.int(),
    lackingCount: z.int(),
    totalSeconds: z.number(),
  })
  .meta({ id: 'ApplySetupResult' });
export type ApplySetupResult = z.infer<typeof ApplySetupResult>;

export const ObservationPatch = z
  .object({ ...plan, repeatCount: z.int().min(1).max(200) })
  .partial()
  .meta({ id: 'ObservationPatch' });
export type ObservationPatch = z.output<typeof ObservationPatch>;

export const RemoveObservations = z
  .object({ observationIds: z.array(Id).min(1).max(MAX_TARGET_COUNT) })
  .meta({ id: 'RemoveObservations' });
export const RemovedObservations = z.object({ removedCount: z.int() }).meta({ id: 'RemovedObservations' });

/** The request in hours: by telescope, instrument and moon class, with how much of it is overhead. */
export const TimeRequest = z
  .object({
    rows: z.array(
      z.object({
        telescopeName: z.string(),
        instrumentName: z.string(),
        moonClass: MoonClass,
        observationCount: z.int(),
        openShutterHours: z.number(),
        overheadHours: z.number(),
        totalHours: z.number(),
      }),
    ),
    totals: HoursByMoonClass,
    totalHours: z.number(),
    infeasibleCount: z.int(),
    lackingCount: z.int(),
  })
  .meta({ id: 'TimeRequest' });
export type TimeRequest = z.infer<typeof TimeRequest>;
