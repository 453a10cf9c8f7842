import type { CosmologyChoice } from '@faintward/contracts/cosmology';
import type { ImportPreview, ImportRequest, ImportResult, TargetComputed } from '@faintward/contracts/targets';
import { Injectable } from '@nestjs/common';
import { DatabaseService } from '../../database/transaction.js';
import { canonicalJson } from '../../engine/canonical-json.js';
import { chooseCosmology } from '../../engine/cosmologies.js';
import { ProposalSkies } from '../../engine/proposal-sky.service.js';
import { inBatches } from '../../engine/slices.js';
import { computeTargetColumns } from '../../engine/target-columns.js';
import type { Actor } from '../../platform/actor.js';
import { HistoryService } from '../../platform/history.js';
import { IdempotencyService } from '../../platform/idempotency.js';
import { validationFailed } from '../../platform/validation.js';
import { NamedPlaces } from './named-places.js';
import { ProposalAccess, type ProposalForMember } from '../proposals/proposal-access.service.js';
import { BATCH_SIZE, TargetRecomputation } from './target-recomputation.service.js';
import { readTargetTable, type TableRow, type TargetTable } from './target-table-reading.js';
import { requireRoom } from './targets.service.js';
import { TargetsQueries } from './targets.queries.js';
import { TargetsReadModel, type TargetPlace } from './targets.read-model.js';

/** Rows that a preview shows: the first ones, and faulty ones up to the limit. */
const FIRST_ROW_COUNT = 50;
const PREVIEW_ROW_COUNT = 500;

/** What the engine made of a table's ready rows, under a cosmology. */
interface PreparedColumns {
  cosmology: CosmologyChoice;
  byRow: ReadonlyMap<TableRow, TargetComputed>;
}

/** Tables of targets, pasted or uploaded. Ready rows are imported; faulty ones are told, row by row, and left out. */
@Injectable()
export class TargetImportsService {
  constructor(
    private readonly database: DatabaseService,
    private readonly access: ProposalAccess,
    private readonly queries: TargetsQueries,
    private readonly readModel: TargetsReadModel,
    private readonly recomputation: TargetRecomputation,
    private readonly skies: ProposalSkies,
    private readonly history: HistoryService,
    private readonly idempotency: IdempotencyService,
  ) {}

  async preview(actor: Actor, proposalId: string, request: ImportRequest): Promise<ImportPreview> {
    await this.access.requireTargets(actor, proposalId);
    const table = await readTargetTable(request);
    const duplicates = duplicatesOf(table, await this.readModel.listPlaces(proposalId));
    const isReady = (row: TableRow) => table.tableErrors.length === 0 && row.target !== undefined;
    const readyCount = table.rows.filter(isReady).length;
    return {
      columns: table.columns,
      delimiter: table.delimiter,
      hasHeader: table.hasHeader,
      rowCount: table.rows.length,
      readyCount,
      faultyCount: table.rows.length - readyCount,
      duplicateCount: duplicates.size,
      rows: chosenRows(table.rows, isReady).map((row) => ({
        lineNumber: row.lineNumber,
        cells: row.cells,
        isReady: isReady(row),
        rowErrors: row.rowErrors,
        isDuplicate: duplicates.has(row),
      })),
      tableErrors: table.tableErrors,
    };
  }

  async import(
    actor: Actor,
    proposalId: string,
    key: string | undefined,
    request: ImportRequest,
  ): Promise<ImportResult> {
    const proposal = await this.access.requireRead(actor, proposalId);
    // Read and computed before the transaction begins: a large table takes longer than others should wait.
    const table = await readTargetTable(request);
    const columns = await this.columnsOf(table, proposal);
    return this.idempotency.idempotent(
      { personId: actor.personId, key, route: `proposals/${proposalId}/targets/import`, body: request },
      () => this.store(actor, proposalId, request, table, columns),
    );
  }

  private async store(
    actor: Actor,
    proposalId: string,
    request: ImportRequest,
    table: TargetTable,
    prepared: PreparedColumns,
  ): Promise<ImportResult> {
    const proposal = await this.access.requireTargetsForChange(actor, proposalId);
    if (table.tableErrors.length > 0) {
      throw validationFailed(table.tableErrors.map((message) => ({ path: 'options.roles', message })));
    }
    const places = await this.readModel.listPlaces(proposalId);
    const skipped = request.options.skipDuplicates ? duplicatesOf(table, places) : new Set<TableRow>();
    const kept = table.rows.flatMap((row) =>
      row.target === undefined || skipped.has(row) ? [] : [{ row, target: row.target }],
    );
    const targets = kept.map(({ target }) => target);
    requireRoom(places.length + targets.length);
    const result: ImportResult = {
      importedCount: targets.length,
      skippedFaultyCount: table.rows.filter((row) => row.target === undefined).length,
      skippedDuplicateCount: skipped.size,
      targetCount: places.length + targets.length,
    };
    if (targets.length === 0) return result;
    // Somebody may have changed the cosmology in between.
    const isPrepared = canonicalJson(prepared.cosmology) === canonicalJson(proposal.cosmology);
    const { byRow } = isPrepared ? prepared : await this.columnsOf(table, proposal);
    const lastPosition = await this.queries.lastPosition(proposalId);
    const rows = kept.map(({ row, target }, index) => {
      const computed = byRow.get(row);
      if (computed === undefined) throw new Error('A ready row of a table got no columns.');
      return { ...target, position: lastPosition + 1 + index, computed };
    });
    await inBatches(rows, BATCH_SIZE, (batch) => this.queries.insertMany(proposalId, batch));
    await this.recomputation.refreshDuplicates(proposalId);
    await this.history.record({
      personId: actor.personId,
      scope: 'proposal',
      scopeId: proposalId,
      subject: 'target',
      subjectId: proposalId,
      subjectName: `${targets.length} targets`,
      action: 'imported',
      details: {
        importedCount: { before: null, after: result.importedCount },
        skippedFaultyCount: { before: null, after: result.skippedFaultyCount },
        skippedDuplicateCount: { before: null, after: result.skippedDuplicateCount },
      },
    });
    await this.access.touch(proposalId);
    return result;
  }

  private async columnsOf(
    table: TargetTable,
    { cosmology, semesterId }: Pick<ProposalForMember, 'cosmology' | 'semesterId'>,
  ): Promise<PreparedColumns> {
    const ready = table.rows.flatMap((row) => (row.target === undefined ? [] : [{ row, target: row.target }]));
    const computed = await computeTargetColumns(
      ready.map(({ target }) => target),
      chooseCosmology(cosmology),
      await this.skies.ofSemester(semesterId),
    );
    return {
      cosmology,
      byRow: new Map(
        ready.flatMap(({ row }, index) => (computed[index] === undefined ? [] : [[row, computed[index]]])),
      ),
    };
  }
}

/** The first rows and as many faulty ones as there is room for, in the order of the text. */
function chosenRows(rows: readonly TableRow[], isReady: (row: TableRow) => boolean): TableRow[] {
  const first = rows.slice(0, FIRST_ROW_COUNT);
  const faulty = rows.slice(FIRST_ROW_COUNT).filter((row) => !isReady(row));
  return [...first, ...faulty.slice(0, PREVIEW_ROW_COUNT - first.length)];
}

/** Ready rows whose name and place, within 2″, a stored target or an earlier row has already. */
function duplicatesOf(table: TargetTable, places: readonly TargetPlace[]): Set<TableRow> {
  const known = new NamedPlaces();
  for (const place of places) known.add(place);
  const found = new Set<TableRow>();
  for (const row of table.rows) {
    if (row.target === undefined) continue;
    if (known.has(row.target)) found.add(row);
    else known.add(row.target);
  }
  return found;
}
