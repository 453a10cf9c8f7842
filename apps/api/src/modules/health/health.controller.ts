import { Controller, Get } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { z } from 'zod';
import { Public } from '../../platform/access.js';
import { Answers } from '../../platform/answers.js';
import { HealthService } from './health.service.js';

const Live = z.object({ state: z.literal('live') }).meta({ id: 'Live' });
const Ready = z
  .object({
    state: z.literal('ready'),
    version: z.string(),
    database: z.enum(['embedded', 'server']),
    jobs: z.literal('running'),
  })
  .meta({ id: 'Ready' });

@ApiTags('health')
@Controller('health')
export class HealthController {
  constructor(private readonly health: HealthService) {}

  @Get()
  @Public()
  @Answers(Live, { description: 'The process answers.' })
  getLive(): z.output<typeof Live> {
    return { state: 'live' };
  }

  @Get('ready')
  @Public()
  @Answers(Ready, { description: 'Database and jobs answer.' })
  getReady(): Promise<z.output<typeof Ready>> {
    return this.health.checkReady();
  }
}
