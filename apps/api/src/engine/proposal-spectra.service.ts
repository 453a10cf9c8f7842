import type { Light } from '@faintward/contracts/light';
import type { RestSpectrum } from '@faintward/photometry';
import { Injectable } from '@nestjs/common';
import { SpectraReadModel } from '../modules/spectra/spectra.read-model.js';
import { NO_UPLOADS, type UploadedSpectra, uploadedSpectrumOf } from './light.js';
import { lightData } from './light-data.js';

const KEPT_COUNT = 100;

/** The uploaded spectra of a proposal, ready for computing. A stored spectrum never changes, so they are kept. */
@Injectable()
export class ProposalSpectra {
  private readonly kept = new Map<string, RestSpectrum>();

  constructor(private readonly spectra: SpectraReadModel) {}

  /** Those that the lights name; one that the proposal does not have is left out. Asks nothing where none is named. */
  async ofLights(proposalId: string, lights: Iterable<Light | null>): Promise<UploadedSpectra> {
    const wanted = new Set<string>();
    for (const light of lights) {
      const spectrumId = light === null ? undefined : uploadedSpectrumOf(light);
      if (spectrumId !== undefined) wanted.add(spectrumId);
    }
    if (wanted.size === 0) return NO_UPLOADS;
    const points = await this.spectra.findPoints(proposalId, [...wanted]);
    const found = new Map<string, RestSpectrum>();
    for (const [spectrumId, { wavelengthsNm, fluxPerNm, contentHash, name, source }] of points) {
      const key = `${spectrumId} ${contentHash}`;
      const spectrum =
        this.kept.get(key) ??
        lightData().restSpectrumOfPoints({
          kind: 'sampled',
          label: name,
          source: source === '' ? 'uploaded by the team' : source,
          wavelengthsNm,
          fluxPerWavelength: fluxPerNm,
        });
      found.set(spectrumId, spectrum);
      this.kept.set(key, spectrum);
    }
    for (const oldest of this.kept.keys()) {
      if (this.kept.size <= KEPT_COUNT) break;
      this.kept.delete(oldest);
    }
    return found;
  }
}
