import { Body, Controller, Get, Param, Patch, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { Id, type ListQuery } from '@faintward/contracts/common';
import {
  InstitutionList,
  PeopleListQuery,
  PeopleSearchQuery,
  PeopleSearchResult,
  PersonPage,
  PersonRecord,
  PersonRolesPatch,
} from '@faintward/contracts/people';
import type { z } from 'zod';
import { Public, Requires } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { IfMatch } from '../../platform/etag.js';
import { PeopleService } from './people.service.js';

@ApiTags('people')
@Controller()
export class PeopleController {
  constructor(private readonly people: PeopleService) {}

  @Get('institutions')
  @Public()
  @Answers(InstitutionList)
  listInstitutions(): Promise<z.output<typeof InstitutionList>> {
    return this.people.listInstitutions();
  }

  @Get('people')
  @Requires('people.search')
  @Answers(PeopleSearchResult)
  search(
    @Query({ schema: PeopleSearchQuery }) query: z.output<typeof PeopleSearchQuery>,
  ): Promise<z.output<typeof PeopleSearchResult>> {
    return this.people.search(query.search);
  }

  @Get('administration/people')
  @Requires('people.manage')
  @Answers(PersonPage)
  list(@Query({ schema: PeopleListQuery }) query: ListQuery): Promise<z.output<typeof PersonPage>> {
    return this.people.list(query);
  }

  @Patch('administration/people/:personId')
  @Requires('people.manage')
  @Answers(PersonRecord)
  updateRoles(
    @CurrentPerson() actor: Actor,
    @Param('personId', { schema: Id }) personId: string,
    @IfMatch() version: number,
    @Body({ schema: PersonRolesPatch }) patch: PersonRolesPatch,
  ): Promise<PersonRecord> {
    return this.people.updateRoles(actor, personId, version, patch);
  }
}
