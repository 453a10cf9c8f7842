import { ReferenceDataList } from '@faintward/contracts/light-report';
import { Controller, Get } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { Public } from '../../platform/access.js';
import { Answers } from '../../platform/answers.js';
import { ReferenceDataService } from './reference-data.service.js';

@ApiTags('reference data')
@Controller('reference-data')
export class ReferenceDataController {
  constructor(private readonly referenceData: ReferenceDataService) {}

  @Get()
  @Public()
  @Answers(ReferenceDataList, { description: 'What the numbers of this installation rest on.' })
  list(): ReferenceDataList {
    return this.referenceData.list();
  }
}
