import { Id } from '@faintward/contracts/common';
import {
  CosmicTime,
  ImportPreview,
  ImportRequest,
  ImportResult,
  NewTarget,
  RemovedTargets,
  RemoveTargets,
  Target,
  TargetListQuery,
  TargetPage,
  TargetPatch,
} from '@faintward/contracts/targets';
import { Body, Controller, Get, Param, Patch, Post, Query, StreamableFile } from '@nestjs/common';
import { ApiOkResponse, ApiProduces, ApiTags } from '@nestjs/swagger';
import type { z } from 'zod';
import { Requires } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { IfMatch } from '../../platform/etag.js';
import { BodyLimit } from '../../platform/http.js';
import { IdempotencyKey } from '../../platform/idempotency.js';
import { TargetImportsService } from './target-imports.service.js';
import { TargetsService } from './targets.service.js';

/** Megabytes of a request that carries a table: twenty million characters and what JSON adds to them. */
const TABLE_MEGABYTES = 25;

@ApiTags('targets')
@Controller('proposals/:proposalId/targets')
export class TargetsController {
  constructor(
    private readonly targets: TargetsService,
    private readonly imports: TargetImportsService,
  ) {}

  @Get()
  @Requires('proposal.read')
  @Answers(TargetPage)
  list(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Query({ schema: TargetListQuery }) query: TargetListQuery,
  ): Promise<z.infer<typeof TargetPage>> {
    return this.targets.list(actor, proposalId, query);
  }

  @Post()
  @Requires('proposal.edit-targets')
  @Answers(Target, { status: 201 })
  create(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Body({ schema: NewTarget }) input: NewTarget,
  ): Promise<Target> {
    return this.targets.create(actor, proposalId, input);
  }

  @Get('cosmic-time')
  @Requires('proposal.read')
  @Answers(CosmicTime)
  cosmicTime(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
  ): Promise<CosmicTime> {
    return this.targets.cosmicTime(actor, proposalId);
  }

  @Get('export.csv')
  @Requires('proposal.read')
  @ApiProduces('text/csv')
  @ApiOkResponse({ description: 'The targets as a table, with the columns the server computes.' })
  async exportCsv(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
  ): Promise<StreamableFile> {
    const { fileName, text } = await this.targets.exportCsv(actor, proposalId);
    return new StreamableFile(Buffer.from(text, 'utf8'), {
      type: 'text/csv; charset=utf-8',
      disposition: `attachment; filename="${fileName}"`,
    });
  }

  @Post('removal')
  @Requires('proposal.edit-targets')
  // Twenty thousand identifiers are 0.8 MB.
  @BodyLimit(2)
  @Answers(RemovedTargets, { status: 200 })
  remove(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Body({ schema: RemoveTargets }) input: RemoveTargets,
  ): Promise<z.infer<typeof RemovedTargets>> {
    return this.targets.remove(actor, proposalId, input.targetIds);
  }

  @Post('import-preview')
  @Requires('proposal.edit-targets')
  @BodyLimit(TABLE_MEGABYTES)
  @Answers(ImportPreview, { status: 200 })
  previewImport(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Body({ schema: ImportRequest }) request: ImportRequest,
  ): Promise<ImportPreview> {
    return this.imports.preview(actor, proposalId, request);
  }

  @Post('import')
  @Requires('proposal.edit-targets')
  @BodyLimit(TABLE_MEGABYTES)
  @Answers(ImportResult, { status: 200 })
  import(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @IdempotencyKey() key: string | undefined,
    @Body({ schema: ImportRequest }) request: ImportRequest,
  ): Promise<ImportResult> {
    return this.imports.import(actor, proposalId, key, request);
  }

  @Get(':targetId')
  @Requires('proposal.read')
  @Answers(Target)
  get(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Param('targetId', { schema: Id }) targetId: string,
  ): Promise<Target> {
    return this.targets.get(actor, proposalId, targetId);
  }

  @Patch(':targetId')
  @Requires('proposal.edit-targets')
  @Answers(Target)
  update(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Param('targetId', { schema: Id }) targetId: string,
    @IfMatch() version: number,
    @Body({ schema: TargetPatch }) patch: TargetPatch,
  ): Promise<Target> {
    return this.targets.update(actor, proposalId, targetId, version, patch);
  }
}
