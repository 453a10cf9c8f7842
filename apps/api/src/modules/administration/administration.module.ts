import { Module } from '@nestjs/common';
import { AdministrationController } from './administration.controller.js';
import { AdministrationReadModel } from './administration.read-model.js';
import { AdministrationService } from './administration.service.js';

@Module({
  controllers: [AdministrationController],
  providers: [AdministrationReadModel, AdministrationService],
})
export class AdministrationModule {}
