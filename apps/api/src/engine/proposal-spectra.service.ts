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
    const found = new Map<string, RestSpectrum>();
    for (const spectrumId of await this.spectra.listOwn(proposalId, [...wanted])) {
      const spectrum = this.kept.get(spectrumId) ?? (await this.read(proposalId, spectrumId));
      if (spectrum === undefined) continue;
      found.set(spectrumId, spectrum);
      // Again at the end: the oldest to be let go is the one that nobody asked for.
      this.kept.delete(spectrumId);
      this.kept.set(spectrumId, spectrum);
    }
    for (const oldest of this.kept.keys()) {
      if (this.kept.size <= KEPT_COUNT) break;
      this.kept.delete(oldest);
    }
    return found;
  }
  private async read(proposalId: string, spectrumId: string): Promise<RestSpectrum | undefined> {
    const points = await this.spectra.findPoints(proposalId, spectrumId);
    if (points === undefined) return undefined;
    return lightData().restSpectrumOfPoints({
      kind: 'sampled',
      label: points.name,
      source: points.source === '' ? 'uploaded by the team' : points.source,
      wavelengthsNm: points.wavelengthsNm,
      fluxPerWavelength: points.fluxPerNm,
    });
  }
}
