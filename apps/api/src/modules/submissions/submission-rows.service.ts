import { createHash } from 'node:crypto';
import { setImmediate as nextTurn } from 'node:timers/promises';
import { Injectable } from '@nestjs/common';
import type { PartKind } from '../../database/schema/submissions.js';
import { canonicalJson } from '../../engine/canonical-json.js';
import { mapInSlices } from '../../engine/slices.js';
import { ObservationsReadModel } from '../observations/observations.read-model.js';
import { TargetsReadModel } from '../targets/targets.read-model.js';
import { SubmissionsQueries } from './submissions.queries.js';

/** Targets or observations that are stored in one row: half a megabyte, a few tens of milliseconds of writing. */
const PART_ROWS = 100;

/** Rows of a submission that are stored, before or together with the submission itself. */
export interface StoredRows {
  submissionId: string;
  /** Changes with every change of what the rows were read from. */
  mark: string;
  /** The canonical JSON of the rows of each part, without brackets: what the fingerprint is taken of. */
  texts: Record<PartKind, string[]>;
  targetCount: number;
}

/** The long lists of submissions: read, written and marked in parts, with turns for other requests in between. */
@Injectable()
export class SubmissionRows {
  constructor(
    private readonly queries: SubmissionsQueries,
    private readonly targets: TargetsReadModel,
    private readonly observations: ObservationsReadModel,
  ) {}

  /** Freezes a proposal's targets and observations as parts of a submission that is still to be made. */
  async store(proposalId: string, submissionId: string): Promise<StoredRows> {
    const stored: StoredRows = {
      submissionId,
      mark: await this.queries.markOfRows(proposalId),
      texts: { targets: [], observations: [] },
      targetCount: 0,
    };
    const storePart = async (kind: PartKind, rows: readonly unknown[]) => {
      const text = (await mapInSlices(rows, canonicalJson)).join(',');
      const ordinal = stored.texts[kind].push(text);
      await this.queries.insertPart({ submissionId, proposalId, kind, ordinal, json: `[${text}]` });
      await nextTurn();
    };
    await this.targets.eachBatch(proposalId, PART_ROWS, async (rows) => {
      stored.targetCount += rows.length;
      await storePart('targets', rows);
    });
    await this.observations.eachBatch(proposalId, PART_ROWS, (rows) => storePart('observations', rows));
    return stored;
  }

  async isUnchanged(proposalId: string, { mark }: StoredRows): Promise<boolean> {
    return mark === (await this.queries.markOfRows(proposalId));
  }
}

/** SHA-256 of the canonical JSON of a content whose long lists are given as texts of their rows. */
export async function fingerprintOfParts(head: object, texts: Record<PartKind, readonly string[]>): Promise<string> {
  const hash = createHash('sha256');
  const fields = [
    ...Object.entries(head).flatMap(([key, value]) =>
      value === undefined ? [] : [[key, canonicalJson(value)] as const],
    ),
    ...Object.entries(texts),
  ].sort(([a], [b]) => (a < b ? -1 : 1));
  hash.update('{');
  for (const [index, [key, text]] of fields.entries()) {
    hash.update(`${index === 0 ? '' : ','}${JSON.stringify(key)}:`);
    if (typeof text === 'string') hash.update(text);
    else {
      hash.update('[');
      await mapInSlices(text, (part, at) => hash.update(`${at === 0 ? '' : ','}${part}`));
      hash.update(']');
    }
  }
  return hash.update('}').digest('hex');
}
