import { Module } from '@nestjs/common';
import { AwardsReadModel } from './awards.read-model.js';

/** The part of awards that knows no other subject's services, so that those which awards build on can import it. */
@Module({ providers: [AwardsReadModel], exports: [AwardsReadModel] })
export class AwardsReadModule {}
