import type { Notice } from '@faintward/contracts/common';
import type { BandId, Extent, Light } from '@faintward/contracts/light';
import type { LightLedger, LightReport, LightReportRequest } from '@faintward/contracts/light-report';
import { distanceRows } from '@faintward/cosmology';
import {
  bestApertureRadiusArcsec,
  deliveredSeeing,
  enclosedFractionAfterSeeing,
  ENGINE_VERSION,
  gaussianEncircledFraction,
  OPTIMUM_RADIUS_OVER_FWHM,
} from '@faintward/exposure';
import {
  type ArrivingLight,
  boxCurve,
  centralMinusEffectiveSurfaceBrightness,
  circularisedRadius,
  drawnSpectrum,
  effectiveMinusMeanSurfaceBrightness,
  fluxDensityJyFromAbMagnitude,
  halfLightRadiusAfterSeeing,
  imageRegime,
  Ledger,
  lensingMag,
  type Response,
  responseOf,
  surfaceBrightnessDimmingMag,
} from '@faintward/photometry';
import { canonicalJson, sha256 } from './canonical-json.js';
import type { ChosenCosmology } from './cosmologies.js';
import { compareCosmologies } from './cosmology-choice.js';
import { toDistanceRow } from './distances.js';
import { meanSurfaceBrightnessOf, resolveExtent, type ResolvedExtent } from './extent.js';
import { lightFaults } from './light-faults.js';
import type { UploadedSpectra } from './light.js';
import { lightData } from './light-data.js';
import { observedLines } from './observed-lines.js';
import { uncertaintyOf } from './light-uncertainty.js';
import { uncertaintyFaults } from './redshift-faults.js';
import {
  absoluteMagnitudeAt,
  arrive,
  defaultBandOf,
  lightNotices,
  magnitudeIn,
  TOO_FAINT,
  ultravioletMagnitudeOf,
} from './source.js';
import { suggestionsAt } from './suggestions.js';

/** What a report is made from beside its request: all that a stored target and a passing visitor do not share. */
export interface ReportSetting {
  cosmology: ChosenCosmology;
  uploaded: UploadedSpectra;
}

export type ReportInputs = Omit<LightReportRequest, 'cosmology'>;

/** Everything that can be said of a source's light, in slices of some tens of milliseconds, most of them for the uncertainty. */
export async function lightReport(inputs: ReportInputs, { cosmology, uploaded }: ReportSetting): Promise<LightReport> {
  const { redshift, light, extent, seeingArcsec } = inputs;
  const data = lightData();
  const [distances] = distanceRows(cosmology.model, [redshift]);
  if (distances === undefined) throw new Error('A batch of one redshift gave no row.');
  const setting = { redshift, cosmology, uploaded };
  const faults = lightFaults({ ...inputs, uploaded });
  const unusableRedshift = uncertaintyFaults(inputs);
  const arriving = light === null || faults.length > 0 ? undefined : arrive(light, extent, setting);
  const range = arriving === undefined || light === null ? undefined : rangeOf(inputs.bandId, light, arriving);

  const wavelengthNm = range?.response.pivotWavelengthNm ?? data.bands[inputs.bandId ?? 'V'].pivotWavelengthNm;
  const fwhmArcsec = deliveredSeeing(seeingArcsec, wavelengthNm, 1).deliveredFwhmArcsec;
  const uvMagnitude = arriving === undefined ? undefined : ultravioletMagnitudeOf(arriving);
  const magnification = light?.magnification ?? 1;
  const size = resolveExtent(extent, {
    redshift,
    kpcPerArcsec: distances.kpcPerArcsec,
    magnification,
    absoluteMagnitudeUv: uvMagnitude,
  });
  const ledger =
    arriving === undefined || range === undefined
      ? null
      : ledgerOf(arriving, range, size, extent, seeingArcsec, fwhmArcsec, inputs.apertureRadiusArcsec);
  const magnitudeAb = ledger?.totalMagnitudeAb ?? null;
  const notices: Notice[] = [
    ...faults.map(({ path, message }) => ({ code: 'lightUnusable', message, severity: 'error' as const, field: path })),
    ...unusableRedshift.map(({ path, message }) => ({
      code: 'uncertaintyUnusable',
      message,
      severity: 'error' as const,
      field: path,
    })),
    ...(light === null ? [] : lightNotices(light)),
    ...(arriving === undefined || range === undefined ? [] : cautionsOf(arriving, range.response)),
  ];
  return {
    cosmologyId: cosmology.id,
    cosmologyTitle: cosmology.title,
    engineVersion: ENGINE_VERSION,
    referenceDataVersion: data.version,
    inputHash: hashOf(inputs, cosmology, uploaded),
    redshift,
    distances: toDistanceRow(distances),
    ledger,
    unlensedMagnitudeAb:
      magnitudeAb === null || magnification === 1 || extent.kind === 'uniform'
        ? null
        : magnitudeAb - lensingMag(magnification),
    absoluteMagnitudeAb: absoluteMagnitudeOf(arriving, wavelengthNm),
    bands: arriving === undefined ? [] : bandsOf(arriving),
    spectrum: spectrumOf(arriving),
    lines: observedLines(redshift, arriving),
    atmosphere: data.atmosphere.map(({ label, kind, lowNm, highNm }) => ({ label, kind, lowNm, highNm })),
    // The magnitude of a line is that of its flux spread over a band: no brightness of a surface.
    image: imageOf(extent, size, arriving?.kind === 'line' ? null : magnitudeAb, fwhmArcsec, redshift),
    uncertainty:
      light === null || arriving === undefined || range === undefined || unusableRedshift.length > 0
        ? null
        : await uncertaintyOf(inputs, light, setting, range.response),
    cosmologies: compareCosmologies(inputs, setting, range?.response),
    suggestions: suggestionsAt(redshift, cosmology, { absoluteMagnitudeUv: uvMagnitude }),
    notices,
  };
}

/** What the ledger sums over. */
interface Range {
  bandId: BandId | null;
  label: string;
  response: Response;
}

/** Part of its wavelength that is looked at around a line which no band holds. */
const AROUND_LINE = 0.01;

function rangeOf(wanted: BandId | null, light: Light, arriving: ArrivingLight): Range {
  const { bands } = lightData();
  const bandId = wanted ?? defaultBandOf(light, arriving);
  const { response, label } = bands[bandId];
  if (wanted === null && arriving.kind === 'line') {
    const { observedWavelengthNm: nm } = arriving;
    if (nm < response.passLowNm || nm > response.passHighNm) {
      const around = responseOf(boxCurve(nm * (1 - AROUND_LINE / 2), nm * (1 + AROUND_LINE / 2)));
      return { bandId: null, label: '1 % around the line', response: around };
    }
  }
  return { bandId, label, response };
}

function ledgerOf(
  arriving: ArrivingLight,
  { bandId, label, response }: Range,
  size: ResolvedExtent | null,
  extent: Extent,
  seeingArcsec: number,
  fwhmArcsec: number,
  apertureRadiusArcsec: number | null,
): LightLedger {
  const ledger = new Ledger();
  // From the luminosity on, also where that is only implied: where every magnitude went.
  const dark = arriving.addStepsFromSource(ledger, response);
  const steps = ledger.steps.filter(({ deltaMag, totalMag }) => Number.isFinite(deltaMag) && Number.isFinite(totalMag));
  const reason = dark ?? (steps.length < ledger.steps.length ? TOO_FAINT : null);
  const total = reason === null ? ledger.totalMag : null;
  const aperture =
    total === null || extent.kind === 'uniform' ? null : apertureOf(size, fwhmArcsec, apertureRadiusArcsec);
  return {
    label,
    bandId,
    wavelengthNm: arriving.kind === 'line' ? arriving.observedWavelengthNm : response.pivotWavelengthNm,
    steps: steps.map((step) => ({ ...step, inputs: [...step.inputs] })),
    totalMagnitudeAb: total,
    lineFluxErgSCm2: arriving.kind === 'line' ? (arriving.fluxErgSCm2() ?? null) : null,
    reason,
    aperture:
      // A circle so small that the computer finds nothing in it is none.
      aperture === null || total === null || !(aperture.enclosedFraction > 0)
        ? null
        : { ...aperture, seeingArcsec, magnitudeAb: total - 2.5 * Math.log10(aperture.enclosedFraction) },
  };
}

function apertureOf(
  size: ResolvedExtent | null,
  fwhmArcsec: number,
  wantedRadiusArcsec: number | null,
): { radiusArcsec: number; enclosedFraction: number } {
  if (size === null) {
    const radiusArcsec = wantedRadiusArcsec ?? OPTIMUM_RADIUS_OVER_FWHM * fwhmArcsec;
    return { radiusArcsec, enclosedFraction: gaussianEncircledFraction(radiusArcsec / fwhmArcsec) };
  }
  const round = circularisedRadius(size.halfLightRadiusArcsec, size.axisRatio);
  const radiusArcsec = wantedRadiusArcsec ?? bestApertureRadiusArcsec(size.sersicIndex, round, fwhmArcsec);
  return {
    radiusArcsec,
    enclosedFraction: enclosedFractionAfterSeeing(size.sersicIndex, round, fwhmArcsec, radiusArcsec),
  };
}

function cautionsOf(arriving: ArrivingLight, response: Response): Notice[] {
  const cautions = arriving.kind === 'line' ? arriving.cautions() : arriving.cautions(response);
  return cautions.map(({ code, message }) => ({ code, message, severity: 'note' }));
}

function absoluteMagnitudeOf(arriving: ArrivingLight | undefined, wavelengthNm: number): number | null {
  if (arriving === undefined || arriving.kind === 'line') return null;
  const { at, frame } = arriving.light;
  const isQuotedAtRest = frame === 'rest' && at.kind === 'wavelength';
  const restNm = isQuotedAtRest ? at.wavelengthNm : wavelengthNm / (1 + arriving.redshift);
  return absoluteMagnitudeAt(arriving, restNm) ?? null;
}

function bandsOf(arriving: ArrivingLight): LightReport['bands'] {
  return Object.values(lightData().bands).map((band) => {
    const found = magnitudeIn(arriving, band.response);
    const magnitudeAb = typeof found === 'number' ? found : null;
    const transmission = arriving.kind === 'line' ? undefined : arriving.intergalacticTransmission(band.response);
    return {
      bandId: band.id,
      label: band.label,
      wavelengthLowNm: band.wavelengthLowNm,
      wavelengthHighNm: band.wavelengthHighNm,
      pivotWavelengthNm: band.pivotWavelengthNm,
      magnitudeAb,
      magnitudeVega: magnitudeAb === null || band.vegaToAbMag === null ? null : magnitudeAb - band.vegaToAbMag,
      fluxDensityJy: magnitudeAb === null ? null : fluxDensityJyFromAbMagnitude(magnitudeAb),
      reason: typeof found === 'number' ? null : { code: found.code, message: found.message },
      intergalacticTransmission: transmission ?? null,
    };
  });
}

/** What is drawn: from the atmosphere's blue end to the mid-infrared. */
const DRAWN_LOW_NM = 300;
const DRAWN_HIGH_NM = 5500;

function spectrumOf(arriving: ArrivingLight | undefined): LightReport['spectrum'] {
  if (arriving === undefined || arriving.kind === 'line') return null;
  const drawn = drawnSpectrum(arriving, DRAWN_LOW_NM, DRAWN_HIGH_NM);
  if (drawn === undefined || drawn.wavelengthsNm.length < 2) return null;
  const { label, source, validLowNm, validHighNm } = arriving.light.spectrum;
  const stretch = 1 + arriving.redshift;
  return { ...drawn, label, source, validLowNm: validLowNm * stretch, validHighNm: validHighNm * stretch };
}

function imageOf(
  extent: Extent,
  size: ResolvedExtent | null,
  magnitudeAb: number | null,
  seeingFwhmArcsec: number,
  redshift: number,
): LightReport['image'] {
  const mean = meanSurfaceBrightnessOf(extent, size, magnitudeAb);
  const round = size === null ? null : circularisedRadius(size.halfLightRadiusArcsec, size.axisRatio);
  const effective =
    mean === null || size === null ? null : mean + effectiveMinusMeanSurfaceBrightness(size.sersicIndex);
  return {
    halfLightRadiusArcsec: size?.halfLightRadiusArcsec ?? null,
    halfLightRadiusKpc: size?.halfLightRadiusKpc ?? null,
    halfLightRadiusAfterSeeingArcsec:
      round === null
        ? extent.kind === 'point'
          ? seeingFwhmArcsec / 2
          : null
        : halfLightRadiusAfterSeeing(round, seeingFwhmArcsec),
    seeingFwhmArcsec,
    meanSurfaceBrightnessAbMagPerArcsec2: mean,
    effectiveSurfaceBrightnessAbMagPerArcsec2: effective,
    centralSurfaceBrightnessAbMagPerArcsec2:
      effective === null || size === null ? null : effective + centralMinusEffectiveSurfaceBrightness(size.sersicIndex),
    restSurfaceBrightnessAbMagPerArcsec2:
      mean === null ? null : mean - surfaceBrightnessDimmingMag(redshift, 'perUnitFrequency'),
    regime: extent.kind === 'uniform' ? 'extended' : imageRegime(round, seeingFwhmArcsec),
    source: size?.source ?? null,
  };
}

function hashOf(inputs: ReportInputs, cosmology: ChosenCosmology, uploaded: UploadedSpectra): string {
  return sha256(
    canonicalJson({
      inputs,
      cosmology: cosmology.parameters,
      referenceDataVersion: lightData().version,
      uploaded: [...uploaded.keys()],
    }),
  );
}
