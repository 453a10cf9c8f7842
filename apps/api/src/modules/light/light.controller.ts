import {
  LightReading,
  LightReadingRequest,
  LightReport,
  LightReportRequest,
  LightSuggestions,
  RedshiftDistributionReading,
  RedshiftDistributionRequest,
  SuggestionsQuery,
} from '@faintward/contracts/light-report';
import { Body, Controller, Get, Post, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { z } from 'zod';
import { Public } from '../../platform/access.js';
import { Answers } from '../../platform/answers.js';
import { BodyLimit } from '../../platform/http.js';
import { RateLimit } from '../../platform/rate-limits.js';
import { LightService } from './light.service.js';

@ApiTags('calculators')
@Controller('light')
export class LightController {
  constructor(private readonly light: LightService) {}

  @Post()
  @Public()
  @RateLimit('calculator')
  @Answers(LightReport, { status: 200 })
  report(@Body({ schema: LightReportRequest }) request: LightReportRequest): Promise<LightReport> {
    return this.light.report(request);
  }

  @Post('reading')
  @Public()
  @RateLimit('calculator')
  @Answers(LightReading, { status: 200 })
  read(@Body({ schema: LightReadingRequest }) request: LightReadingRequest): LightReading {
    return this.light.read(request);
  }

  @Post('redshift-distribution')
  @Public()
  @RateLimit('calculator')
  @BodyLimit(3)
  @Answers(RedshiftDistributionReading, { status: 200 })
  readRedshiftDistribution(
    @Body({ schema: RedshiftDistributionRequest }) request: z.output<typeof RedshiftDistributionRequest>,
  ): Promise<RedshiftDistributionReading> {
    return this.light.readRedshiftDistribution(request.text);
  }

  @Get('suggestions')
  @Public()
  @RateLimit('calculator')
  @Answers(LightSuggestions)
  suggest(@Query({ schema: SuggestionsQuery }) query: z.output<typeof SuggestionsQuery>): LightSuggestions {
    return this.light.suggest(query);
  }
}
