import type { SizeRelation } from '@faintward/contracts/light';
import type {
  LightReading,
  LightReadingRequest,
  LightReport,
  LightReportRequest,
  LightSuggestions,
  RedshiftDistributionReading,
} from '@faintward/contracts/light-report';
import { AntipodeError } from '@faintward/cosmology';
import { Injectable } from '@nestjs/common';
import { chooseCosmology } from '../../engine/cosmologies.js';
import { lightFaults } from '../../engine/light-faults.js';
import { NO_UPLOADS } from '../../engine/light.js';
import { lightReport } from '../../engine/light-report.js';
import { uncertaintyFaults } from '../../engine/redshift-faults.js';
import { suggestionsAt } from '../../engine/suggestions.js';
import { invalidField } from '../../platform/domain-error.js';
import { validationFailed } from '../../platform/validation.js';
import { readRedshiftDistribution } from './redshift-distribution-text.js';
import { readTypedLight } from './typed-light.js';

/** What can be said of a light without an account. */
@Injectable()
export class LightService {
  /** @throws {DomainError} `validation-failed` naming the inputs that cannot be computed with */
  async report({ cosmology: choice, ...inputs }: LightReportRequest): Promise<LightReport> {
    const cosmology = chooseCosmology(choice);
    const faults = [...lightFaults({ ...inputs, uploaded: NO_UPLOADS }), ...uncertaintyFaults(inputs)];
    if (faults.length > 0) throw validationFailed(faults);
    try {
      return await lightReport(inputs, { cosmology, uploaded: NO_UPLOADS });
    } catch (error) {
      if (!(error instanceof AntipodeError)) throw error;
      throw invalidField(
        'redshift',
        `This closed universe has its antipode at redshift ${error.allowed.maximum.toPrecision(6)}; beyond it nothing can be computed.`,
      );
    }
  }

  read(request: LightReadingRequest): LightReading {
    return readTypedLight(request);
  }

  readRedshiftDistribution(text: string): Promise<RedshiftDistributionReading> {
    return readRedshiftDistribution(text);
  }

  suggest({ redshift, relation }: { redshift: number; relation?: SizeRelation | undefined }): LightSuggestions {
    return { rows: suggestionsAt(redshift, chooseCosmology('planck18'), { relation }) };
  }
}
