import type { BandId, Spectrum } from '@faintward/contracts/light';
import {
  type AtmosphericRange,
  type Band,
  createAtmosphere,
  createBands,
  createInoue2014,
  createLines,
  createMadau1995,
  forestNodesNm,
  type IntergalacticMedium,
  type Response,
  responseOf,
  type RestSpectrum,
  restSpectrum,
  type SampledSource,
  type SourceTemplates,
  sourceTemplates,
  supernovaPhaseMag,
  type SpectralLine,
  type TypicalValues,
} from '@faintward/photometry';
import { loadReferenceFiles } from '../reference-data/reference-data.js';

/** All that light is computed with beside the light itself: the reference data, made ready. */
export interface LightData {
  /** Of the reference data; stored beside every result. */
  readonly version: string;
  readonly bands: Readonly<Record<BandId, Band & { readonly response: Response }>>;
  readonly lines: readonly SpectralLine[];
  readonly atmosphere: readonly AtmosphericRange[];
  readonly media: Readonly<Record<'inoue2014' | 'madau1995', IntergalacticMedium>>;
  readonly templates: SourceTemplates;
  readonly typical: TypicalValues;
  /** Kept: making one takes a millisecond, and lists of thousands use a few. */
  restSpectrumOf(spectrum: Exclude<Spectrum, { kind: 'uploaded' }>): RestSpectrum;
  restSpectrumOfPoints(source: SampledSource): RestSpectrum;
  /** How much fainter in B a type Ia supernova is than at its maximum. Kept: every draw of a redshift asks for the same. */
  supernovaPhaseMagOf(phaseDays: number): number;
}

const KEPT_SPECTRA = 500;
let made: LightData | undefined;

/** The reference data, read at its first use. */
export function lightData(): LightData {
  return (made ??= makeLightData());
}

function makeLightData(): LightData {
  const { version, photometry: files } = loadReferenceFiles();
  const media = {
    inoue2014: createInoue2014(files.intergalacticInoue2014.data),
    madau1995: createMadau1995(files.intergalacticMadau1995.data),
  };
  // One set of points for both media, so that spectra need not know which of them is chosen.
  const jumpsNm = [...new Set(Object.values(media).flatMap(forestNodesNm))].sort((a, b) => a - b);
  const templates = sourceTemplates(files);
  const bands = createBands(files.bands);
  const kept = new Map<string, RestSpectrum>();
  let phase: { days: number; mag: number } | undefined;
  return {
    version,
    bands: Object.fromEntries(
      Object.entries(bands).map(([id, band]) => [id, { ...band, response: responseOf(band.curve) }]),
    ) as LightData['bands'],
    lines: createLines(files.lines),
    atmosphere: createAtmosphere(files.atmosphere),
    media,
    templates,
    typical: files.typicalValues.data,
    restSpectrumOf(spectrum) {
      const key = JSON.stringify(spectrum);
      let found = kept.get(key);
      if (found === undefined) {
        found = restSpectrum(spectrum, templates, jumpsNm);
        kept.set(key, found);
        for (const oldest of kept.keys()) {
          if (kept.size <= KEPT_SPECTRA) break;
          kept.delete(oldest);
        }
      }
      return found;
    },
    supernovaPhaseMagOf(days) {
      if (phase?.days !== days) phase = { days, mag: supernovaPhaseMag(days, bands.B.curve, templates) };
      return phase.mag;
    },
    restSpectrumOfPoints: (source) => restSpectrum(source, templates, jumpsNm),
  };
}
