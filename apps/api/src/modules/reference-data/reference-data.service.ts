import type { ReferenceDataList } from '@faintward/contracts/light-report';
import { Injectable } from '@nestjs/common';
import { loadReferenceFiles } from '../../reference-data/reference-data.js';

@Injectable()
export class ReferenceDataService {
  /** Read when the application starts, so that a file that cannot be used stops it there and not at the first request. */
  private readonly reference = loadReferenceFiles();

  list(): ReferenceDataList {
    return { version: this.reference.version, rows: [...this.reference.files] };
  }
}
