import { CosmologyPresetList } from '@faintward/contracts/cosmology';
import { DistancesRequest, DistancesResponse } from '@faintward/contracts/distances';
import { Estimate, EstimateRequest } from '@faintward/contracts/estimates';
import { Body, Controller, Get, HttpCode, Post, type StreamableFile } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import type { z } from 'zod';
import { Public } from '../../platform/access.js';
import { Answers } from '../../platform/answers.js';
import { BodyLimit } from '../../platform/http.js';
import { RateLimit } from '../../platform/rate-limits.js';
import { rowsInPieces } from '../../platform/rows-in-pieces.js';
import { EstimatesService } from './estimates.service.js';

/** Above this an answer is written in pieces. */
const MANY_ROWS = 2000;

@ApiTags('calculators')
@Controller()
export class EstimatesController {
  constructor(private readonly estimates: EstimatesService) {}

  @Get('cosmologies')
  @Public()
  @Answers(CosmologyPresetList)
  listCosmologies(): z.infer<typeof CosmologyPresetList> {
    return this.estimates.listCosmologies();
  }

  // Named for the documentation, but not sieved: of a hundred thousand rows that would take longer than computing them, and
  // they hold nothing but the numbers of the request.
  @Post('distances')
  @Public()
  @RateLimit('calculator')
  @BodyLimit(4)
  @HttpCode(200)
  @ApiOkResponse({ standardSchema: DistancesResponse })
  async computeDistances(
    @Body({ schema: DistancesRequest }) request: DistancesRequest,
  ): Promise<DistancesResponse | StreamableFile> {
    const answer = await this.estimates.computeDistances(request);
    return answer.rows.length > MANY_ROWS ? rowsInPieces(answer) : answer;
  }

  @Post('estimates')
  @Public()
  @RateLimit('calculator')
  @Answers(Estimate, { status: 200 })
  estimate(@Body({ schema: EstimateRequest }) request: EstimateRequest): Promise<Estimate> {
    return this.estimates.estimate(request);
  }
}
