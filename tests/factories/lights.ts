import {
  type ContinuumLight,
  createInoue2014,
  createMadau1995,
  forestNodesNm,
  type LineLight,
  type RestSpectrum,
  restSpectrum,
  type SourceKind,
  sourceTemplates,
} from '@faintward/photometry';
import { photometryFiles } from './photometry-files.js';

const files = photometryFiles();
export const INOUE = createInoue2014(files.intergalacticInoue2014.data);
export const MADAU = createMadau1995(files.intergalacticMadau1995.data);
const TEMPLATES = sourceTemplates(files);
const JUMPS = [...new Set([INOUE, MADAU].flatMap(forestNodesNm))].sort((a, b) => a - b);

export const spectrumOf = (kind: SourceKind): RestSpectrum => restSpectrum(kind, TEMPLATES, JUMPS);

const powerLaws = new Map<string, RestSpectrum>();

/** Kept, because properties ask for the same few hundreds of times. */
export function powerLaw(slopeBeta: number, escapeFraction = 0): RestSpectrum {
  const key = `${slopeBeta} ${escapeFraction}`;
  let known = powerLaws.get(key);
  if (known === undefined) powerLaws.set(key, (known = spectrumOf({ kind: 'powerLaw', slopeBeta, escapeFraction })));
  return known;
}
const FLAT = powerLaw(-2);

const bare = { hostDust: null, galacticDust: null, magnification: 1, medium: INOUE };

/** M = −21 at 150 nm of a flat f_ν, as it leaves the source. */
export function absoluteLight(overrides: Partial<ContinuumLight> = {}): ContinuumLight {
  return {
    kind: 'continuum',
    frame: 'rest',
    quoted: { kind: 'absoluteMagnitude', magnitude: -21, toAbMag: 0, inputs: [] },
    at: { kind: 'wavelength', wavelengthNm: 150 },
    spectrum: FLAT,
    includes: { hostDust: true, galacticDust: false, lensing: false },
    ...bare,
    ...overrides,
  };
}

/** m = 24 at a wavelength or in a band, as it is seen. */
export function apparentLight(at: ContinuumLight['at'], overrides: Partial<ContinuumLight> = {}): ContinuumLight {
  return {
    ...absoluteLight(),
    frame: 'observed',
    quoted: { kind: 'apparentMagnitude', magnitude: 24, toAbMag: 0, inputs: [] },
    at,
    includes: { hostDust: true, galacticDust: true, lensing: true },
    ...overrides,
  };
}

/** Hα of 10⁴² erg/s. */
export function lineLight(overrides: Partial<LineLight> = {}): LineLight {
  return {
    kind: 'line',
    frame: 'rest',
    quoted: { kind: 'lineLuminosity', amount: 1e42, inputs: [] },
    restWavelengthNm: 656.4614,
    velocityWidthKmS: 200,
    continuum: { kind: 'none' },
    escapeFraction: 1,
    includes: { hostDust: true, galacticDust: false, lensing: false },
    ...bare,
    ...overrides,
  };
}
