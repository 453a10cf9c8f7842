import { Module } from '@nestjs/common';
import { ProposalOutcomesService } from './proposal-outcomes.service.js';

@Module({ providers: [ProposalOutcomesService], exports: [ProposalOutcomesService] })
export class ProposalOutcomesModule {}
