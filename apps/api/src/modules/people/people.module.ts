import { Module } from '@nestjs/common';
import { PeopleController } from './people.controller.js';
import { PeopleQueries } from './people.queries.js';
import { PeopleReadModel } from './people.read-model.js';
import { PeopleService } from './people.service.js';

@Module({
  controllers: [PeopleController],
  providers: [PeopleQueries, PeopleReadModel, PeopleService],
  exports: [PeopleReadModel],
})
export class PeopleModule {}
