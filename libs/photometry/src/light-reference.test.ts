/**
 * Check values of tests/reference/light.json: lights followed by sums of fine steps in another language, with formulas of dust and
 * hydrogen of its own. Tolerance 3e-6 mag: straight lines between points 1e-3 apart in ln λ on this side, rounding at the edges of
 * bands on the other; 2e-5 where the steep absorption of the Lyman continuum by Madau 1995 is drawn straight.
 */
import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { absoluteLight, INOUE, lineLight, MADAU, spectrumOf } from '../../../tests/factories/lights.js';
import { photometryFiles } from '../../../tests/factories/photometry-files.js';
import {
  arrivingLight,
  type BandId,
  type ContinuumLight,
  createBands,
  type GalacticDustScreen,
  type HostDustScreen,
  type Includes,
  Ledger,
  type LuminosityDistances,
  responseOf,
  type SourceKind,
} from './index.js';

interface Case {
  case: string;
  redshift: number;
  luminosityDistanceMpc: number;
  literatureDistanceMpc: number | null;
  frame: 'observed' | 'rest';
  hostDust: HostDustScreen | null;
  galacticDust: GalacticDustScreen | null;
  magnification: number;
  includes: Includes;
}
interface ContinuumCase extends Case {
  kind: 'continuum';
  magnitudeAb: number;
  at: BandId | number;
  source: SourceKind;
  medium: 'inoue2014' | 'madau1995';
  isSurface: boolean;
  expectedMagnitudesAb: Partial<Record<BandId, number>>;
}
interface LineCase extends Case {
  kind: 'line';
  amount: number;
  restWavelengthNm: number;
  bandId: BandId;
  escapeFraction: number;
  expectedFluxErgSCm2: number;
  expectedMagnitudeAb: number;
}

const { cases } = JSON.parse(readFileSync(new URL('../../../tests/reference/light.json', import.meta.url), 'utf8')) as {
  cases: (ContinuumCase | LineCase)[];
};
const bands = createBands(photometryFiles().bands);
const responseIn = (id: BandId) => responseOf(bands[id].curve);

const at = (distanceMpc: number): LuminosityDistances => ({ luminosityDistanceMpc: () => distanceMpc });
const wayOf = ({ hostDust, galacticDust, magnification, includes, literatureDistanceMpc }: Case) => ({
  hostDust,
  galacticDust,
  magnification,
  includes,
  ...(literatureDistanceMpc === null ? {} : { derivedWith: at(literatureDistanceMpc) }),
});

function quotedAt(place: BandId | number): ContinuumLight['at'] {
  return typeof place === 'number'
    ? { kind: 'wavelength', wavelengthNm: place }
    : { kind: 'response', response: responseIn(place), label: place };
}

describe('light followed from end to end', () => {
  it.each(cases.filter((each) => each.kind === 'continuum'))('$case at z = $redshift', (each) => {
    const light = absoluteLight({
      ...wayOf(each),
      frame: each.frame,
      quoted: { kind: 'absoluteMagnitude', magnitude: each.magnitudeAb, toAbMag: 0, inputs: [] },
      at: quotedAt(each.at),
      spectrum: spectrumOf(each.source),
      medium: each.medium === 'madau1995' ? MADAU : INOUE,
    });
    const arriving = arrivingLight(light, each.redshift, at(each.luminosityDistanceMpc), each.isSurface);
    const tolerance = each.medium === 'madau1995' ? 2e-5 : 3e-6;
    for (const [id, expected] of Object.entries(each.expectedMagnitudesAb) as [BandId, number][]) {
      const found = arriving.magnitudeIn(responseIn(id));
      expect(Math.abs((found as number) - expected), id).toBeLessThan(tolerance);
      const ledger = new Ledger();
      arriving.addSteps(ledger, responseIn(id));
      expect(ledger.totalMag).toBeCloseTo(found as number, 9);
    }
  });

  it.each(cases.filter((each) => each.kind === 'line'))('$case at z = $redshift', (each) => {
    const light = lineLight({
      ...wayOf(each),
      frame: each.frame,
      quoted: { kind: 'lineLuminosity', amount: each.amount, inputs: [] },
      restWavelengthNm: each.restWavelengthNm,
      escapeFraction: each.escapeFraction,
    });
    const arriving = arrivingLight(light, each.redshift, at(each.luminosityDistanceMpc));
    if (arriving.kind !== 'line') throw new Error('not a line');
    expect(Math.abs((arriving.magnitudeIn(responseIn(each.bandId)) as number) - each.expectedMagnitudeAb)).toBeLessThan(
      3e-6,
    );
    expect(Math.abs(arriving.fluxErgSCm2()! / each.expectedFluxErgSCm2 - 1)).toBeLessThan(1e-6);
  });
});
