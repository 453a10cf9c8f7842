import { Id } from '@faintward/contracts/common';
import { Ranking } from '@faintward/contracts/reviews';
import { Controller, Get, Param, StreamableFile } from '@nestjs/common';
import { ApiProduces, ApiTags } from '@nestjs/swagger';
import { Requires } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { RankingService } from './ranking.service.js';

@ApiTags('ranking')
@Controller('panels/:panelId')
export class RankingController {
  constructor(private readonly ranking: RankingService) {}

  @Get('ranking')
  @Requires('panel.rank')
  @Answers(Ranking)
  get(@CurrentPerson() actor: Actor, @Param('panelId', { schema: Id }) panelId: string): Promise<Ranking> {
    return this.ranking.get(actor, panelId);
  }

  @Get('ranking.csv')
  @Requires('panel.rank')
  @ApiProduces('text/csv')
  async exportCsv(
    @CurrentPerson() actor: Actor,
    @Param('panelId', { schema: Id }) panelId: string,
  ): Promise<StreamableFile> {
    const { fileName, text } = await this.ranking.exportCsv(actor, panelId);
    return new StreamableFile(Buffer.from(text, 'utf8'), {
      type: 'text/csv; charset=utf-8',
      disposition: `attachment; filename="${fileName}"`,
    });
  }
}
