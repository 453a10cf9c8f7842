/**
 * The hours of a list of point sources imaged through one filter, worked out from the published formulas alone and
 * without the product's libraries, so that the journey can compare what is on the screen with a second opinion.
 */
export interface ImagingByHand {
  diameterM: number;
  obstructionDiameterM: number;
  throughput: number;
  wavelengthLowNm: number;
  wavelengthHighNm: number;
  extinctionMagPerAirmass: number;
  skyAbMagPerArcsec2: number;
  pixelScaleArcsec: number;
  darkElectronsPerSecond: number;
  readNoiseElectrons: number;
  gainElectronsPerAdu: number;
  imageQualityFwhmArcsec: number;
  outerScaleM: number;
  systematicErrorFraction: number;
  minimumExposureCount: number;
  acquisitionSeconds: number;
  setupSeconds: number;
  readoutSeconds: number;
  ditherSeconds: number;
  maximumBlockSeconds: number;
  seeingArcsec: number;
  airmass: number;
  signalToNoise: number;
  exposureSeconds: number;
}

const planckJS = 6.626_070_15e-34;
/** Vega to AB in V (Blanton & Roweis 2007, AJ 133, 734). */
export const vegaToAbV = 0.02;

export function secondsByHand(
  magnitudeAb: number,
  setup: ImagingByHand,
): { exposureCount: number; totalSeconds: number } {
  const middleNm = Math.sqrt(setup.wavelengthLowNm * setup.wavelengthHighNm);
  const areaM2 = (Math.PI / 4) * (setup.diameterM ** 2 - setup.obstructionDiameterM ** 2);

  // A source flat in f_ν: photons per second and m² in a box band are f_ν/h · ln(λ2/λ1) (Oke & Gunn 1983 for the zero point).
  const photonsPerSecond = (magAb: number) =>
    ((10 ** (-0.4 * (magAb + 48.6)) * 1e-3) / planckJS) *
    Math.log(setup.wavelengthHighNm / setup.wavelengthLowNm) *
    areaM2 *
    setup.throughput;

  // Seeing: Kolmogorov in wavelength and airmass, outer scale after Tokovinin 2002 (PASP 114, 1156), instrument in quadrature.
  const kolmogorovArcsec = setup.seeingArcsec * (middleNm / 500) ** -0.2 * setup.airmass ** 0.6;
  const friedM = (0.976 * middleNm * 1e-9 * 206_264.806_247) / kolmogorovArcsec;
  const atmosphereArcsec = kolmogorovArcsec * Math.sqrt(1 - 2.183 * (friedM / setup.outerScaleM) ** 0.356);
  const fwhmArcsec = Math.hypot(atmosphereArcsec, setup.imageQualityFwhmArcsec);

  // Best aperture of a Gaussian image against sky: 0.6731729 FWHM, holding 0.7153319 of the light.
  const radiusArcsec = 0.673_172_911 * fwhmArcsec;
  const enclosed = 1 - Math.exp(-4 * Math.LN2 * (radiusArcsec / fwhmArcsec) ** 2);
  const pixelCount = (Math.PI * radiusArcsec ** 2) / setup.pixelScaleArcsec ** 2;

  const source = photonsPerSecond(magnitudeAb + setup.extinctionMagPerAirmass * setup.airmass) * enclosed;
  const sky = photonsPerSecond(setup.skyAbMagPerArcsec2) * setup.pixelScaleArcsec ** 2;
  // Read noise with digitisation, 0.289 ADU (Merline & Howell 1995, Exp. Astron. 6, 163).
  const readVariance = setup.readNoiseElectrons ** 2 + setup.gainElectronsPerAdu ** 2 / 12;

  // Number of exposures of the given length from the CCD equation; the systematic floor raises the statistical S/N needed.
  const wantedSquared = 1 / (1 / setup.signalToNoise ** 2 - setup.systematicErrorFraction ** 2);
  const t = setup.exposureSeconds;
  const variancePerExposure = source * t + pixelCount * ((sky + setup.darkElectronsPerSecond) * t + readVariance);
  const exposureCount = Math.max(
    setup.minimumExposureCount,
    Math.ceil((wantedSquared * variancePerExposure) / (source * t) ** 2 - 1e-9),
  );

  const cycleSeconds = t + setup.readoutSeconds + setup.ditherSeconds;
  const exposuresPerBlock = Math.max(1, Math.floor(setup.maximumBlockSeconds / cycleSeconds + 1e-9));
  const blockCount = Math.ceil(exposureCount / exposuresPerBlock);
  return {
    exposureCount,
    totalSeconds: exposureCount * cycleSeconds + blockCount * setup.acquisitionSeconds + setup.setupSeconds,
  };
}
