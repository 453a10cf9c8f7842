import { Controller, Get, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { MailboxMessage } from '@faintward/contracts/accounts';
import { ListQuery } from '@faintward/contracts/common';
import { AuditPage, OutgoingMailPage } from '@faintward/contracts/people';
import { z } from 'zod';
import { Public, Requires } from '../../platform/access.js';
import { type Actor, OptionalPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { AdministrationService } from './administration.service.js';

const Mailbox = z.object({ rows: z.array(MailboxMessage) }).meta({ id: 'Mailbox' });

@ApiTags('administration')
@Controller()
export class AdministrationController {
  constructor(private readonly administration: AdministrationService) {}

  @Get('administration/changes')
  @Requires('audit.read')
  @Answers(AuditPage)
  listChanges(@Query({ schema: ListQuery }) query: ListQuery): Promise<z.output<typeof AuditPage>> {
    return this.administration.listChanges(query);
  }

  @Get('administration/mail')
  @Requires('mail.read')
  @Answers(OutgoingMailPage)
  listMail(@Query({ schema: ListQuery }) query: ListQuery): Promise<z.output<typeof OutgoingMailPage>> {
    return this.administration.listMail(query);
  }

  @Get('mailbox')
  @Public()
  @Answers(Mailbox, { description: 'What the local mail fake caught: open in the demo, else for administrators.' })
  listMailbox(@OptionalPerson() actor: Actor | undefined): Promise<z.output<typeof Mailbox>> {
    return this.administration.listMailbox(actor);
  }
}
