import { Id } from '@faintward/contracts/common';
import { OpenCalls, Semester, SemesterInput, SemesterList, SemesterPatch } from '@faintward/contracts/semesters';
import { Body, Controller, Get, Param, Patch, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { Public, Requires, SignedIn } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { IfMatch } from '../../platform/etag.js';
import { SemestersService } from './semesters.service.js';

@ApiTags('semesters')
@Controller()
export class SemestersController {
  constructor(private readonly semesters: SemestersService) {}

  @Get('calls')
  @Public()
  @Answers(OpenCalls)
  listCalls(): Promise<OpenCalls> {
    return this.semesters.listCalls();
  }

  @Get('semesters')
  @SignedIn()
  @Answers(SemesterList)
  list(): Promise<{ rows: Semester[] }> {
    return this.semesters.list();
  }

  @Get('semesters/:semesterId')
  @SignedIn()
  @Answers(Semester)
  get(@Param('semesterId', { schema: Id }) semesterId: string): Promise<Semester> {
    return this.semesters.get(semesterId);
  }

  @Post('semesters')
  @Requires('semester.manage')
  @Answers(Semester, { status: 201 })
  create(@CurrentPerson() actor: Actor, @Body({ schema: SemesterInput }) input: SemesterInput): Promise<Semester> {
    return this.semesters.create(actor, input);
  }

  @Patch('semesters/:semesterId')
  @Requires('semester.manage')
  @Answers(Semester)
  update(
    @CurrentPerson() actor: Actor,
    @Param('semesterId', { schema: Id }) semesterId: string,
    @IfMatch() version: number,
    @Body({ schema: SemesterPatch }) patch: SemesterPatch,
  ): Promise<Semester> {
    return this.semesters.update(actor, semesterId, version, patch);
  }
}
