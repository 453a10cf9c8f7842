import type { LightReport, ObservedLine } from '@faintward/contracts/light-report';
import type { LightStep } from '@faintward/contracts/estimates';

/**
 * A report as the server gives it: a galaxy at z = 7 with M_UV = −21 and a flat spectrum per unit frequency, in planck18.
 * Distances are those of the calculator; m = −21 + 49.2407 − 2.5 log10 8 = 25.983.
 */
const breakNm = 121.567 * 8;
const abMagnitude = 25.983;
const fluxJy = 3631 * 10 ** (-0.4 * abMagnitude);

const source = 'Hogg, Baldry, Blanton & Eisenstein 2002, astro-ph/0210394';

export const ledgerSteps: LightStep[] = [
  {
    id: 'absolute-magnitude',
    stage: 'source',
    title: 'Absolute magnitude as given',
    deltaMag: -21,
    totalMag: -21,
    formula: 'M, at 10 pc',
    inputs: [{ name: 'rest wavelength', value: 150, unit: 'nm' }],
    source: 'the investigator',
  },
  {
    id: 'distance-modulus',
    stage: 'space',
    title: 'Distance modulus',
    deltaMag: 49.2407,
    totalMag: 28.2407,
    formula: '5 log10(D_L / 10 pc)',
    inputs: [{ name: 'luminosity distance', value: 70492.49, unit: 'Mpc' }],
    source: 'Hogg 1999, astro-ph/9905116, section 9',
  },
  {
    id: 'redshift-bandwidth',
    stage: 'space',
    title: 'Stretched bandwidth',
    deltaMag: -2.2577,
    totalMag: 25.983,
    formula: '−2.5 log10(1 + z)',
    inputs: [{ name: 'redshift', value: 7, unit: '' }],
    source,
  },
  {
    id: 'spectral-slope',
    stage: 'space',
    title: 'Spectrum between the given wavelength and the band',
    deltaMag: 0,
    totalMag: 25.983,
    formula: '−2.5 log10[∫ (λ/λ₀)^(2+β) d ln λ / ∫ d ln λ]',
    inputs: [{ name: 'slope β', value: -2, unit: '' }],
    source,
  },
  {
    id: 'hydrogen-absorption',
    stage: 'space',
    title: 'Intergalactic hydrogen',
    deltaMag: 0,
    totalMag: 25.983,
    formula: '−2.5 log10 of the mean transmission in the band',
    inputs: [{ name: 'mean transmission', value: 1, unit: '' }],
    source: 'Inoue et al. 2014, MNRAS 442, 1805',
  },
];

const further: readonly (readonly [string, LightStep['stage'], string, number, string])[] = [
  ['galactic-dust', 'space', 'Galactic dust', 0.0206, 'A(λ) = k(λ) E(B−V)'],
  ['lensing', 'space', 'Lensing magnification', -0.3653, '−2.5 log10 μ'],
  ['atmospheric-extinction', 'atmosphere', 'Atmospheric extinction', 0.072, 'k X'],
  ['throughput', 'instrument', 'Telescope, instrument and detector', 1.307, '−2.5 log10 η'],
  ['aperture', 'instrument', 'Light outside the aperture', 0.364, '−2.5 log10 of the enclosed fraction'],
  ['collecting', 'counting', 'Mirror area and bandwidth', -28.877, '−2.5 log10(N_AB=0 · A · Δln λ)'],
];

/** Such a light behind dust and a lens, followed to counted electrons by an estimate. */
export const estimateSteps: LightStep[] = further.reduce<LightStep[]>(
  (steps, [id, stage, title, deltaMag, formula]) => [
    ...steps,
    {
      id,
      stage,
      title,
      deltaMag,
      totalMag: steps.at(-1)!.totalMag + deltaMag,
      formula,
      inputs: [],
      source: 'configuration of the mode',
    },
  ],
  ledgerSteps,
);

const line = (
  lineId: string,
  label: string,
  restWavelengthNm: number,
  place: ObservedLine['place'],
  placeLabel: string,
  bandIds: ObservedLine['bandIds'] = [],
): ObservedLine => ({
  lineId,
  label,
  restWavelengthNm,
  observedWavelengthNm: restWavelengthNm * 8,
  observedAirWavelengthNm: restWavelengthNm * 8 * (1 - 2.74e-4),
  bandIds,
  place,
  placeLabel,
  fluxErgSCm2: null,
  observedEquivalentWidthNm: null,
});

const broken = { code: 'noFluxInBand', message: 'No flux in this band: the Lyman break is at 0.97 µm.' };

const band = (
  bandId: LightReport['bands'][number]['bandId'],
  wavelengthLowNm: number,
  wavelengthHighNm: number,
  vegaOffset: number | null,
): LightReport['bands'][number] => {
  const hasLight = wavelengthHighNm > breakNm;
  return {
    bandId,
    label: bandId,
    wavelengthLowNm,
    wavelengthHighNm,
    pivotWavelengthNm: Math.sqrt(wavelengthLowNm * wavelengthHighNm),
    magnitudeAb: hasLight ? abMagnitude : null,
    magnitudeVega: hasLight && vegaOffset !== null ? abMagnitude - vegaOffset : null,
    fluxDensityJy: hasLight ? fluxJy : null,
    reason: hasLight ? null : broken,
    intergalacticTransmission: hasLight ? 1 : null,
  };
};

const wavelengthsNm = Array.from({ length: 241 }, (_, index) => 300 * (2500 / 300) ** (index / 240));

const redshifts = Array.from({ length: 161 }, (_, index) => index * 0.05);
const bell = (redshift: number, mean: number, sigma: number) =>
  Math.exp(-0.5 * ((redshift - mean) / sigma) ** 2) / (sigma * Math.sqrt(2 * Math.PI));

export const lightReport: LightReport = {
  cosmologyId: 'planck18',
  cosmologyTitle: 'Planck 2018',
  engineVersion: '0.2.0',
  referenceDataVersion: '5c1e77a0b2d4',
  inputHash: '9f2ac0417be3d5518c6f7a90',
  redshift: 7,
  distances: {
    redshift: 7,
    comovingDistanceMpc: 8811.5608,
    transverseComovingDistanceMpc: 8811.5608,
    angularDiameterDistanceMpc: 1101.4451,
    luminosityDistanceMpc: 70492.4864,
    distanceModulusMag: 49.240714,
    kpcPerArcsec: 5.339957,
    comovingVolumeMpc3: 2.8658083e12,
    lookbackTimeGyr: 13.026306,
    ageGyr: 0.760579,
    hubbleKmSMpc: 856.6019,
    criticalDensityGCm3: 1.378265e-27,
    bolometricDimmingMag: 9.0309,
    perFrequencyDimmingMag: 6.77317,
    perWavelengthDimmingMag: 11.288625,
    photonRateDimmingMag: 6.77317,
  },
  ledger: {
    label: 'J',
    bandId: 'J',
    wavelengthNm: 1250,
    steps: ledgerSteps,
    totalMagnitudeAb: abMagnitude,
    lineFluxErgSCm2: null,
    reason: null,
    aperture: { radiusArcsec: 0.363, seeingArcsec: 0.54, enclosedFraction: 0.7154, magnitudeAb: 26.3466 },
  },
  unlensedMagnitudeAb: null,
  absoluteMagnitudeAb: -21,
  bands: [
    band('U', 330, 400, 0.79),
    band('B', 390, 500, -0.09),
    band('V', 505, 595, 0.02),
    band('R', 570, 730, 0.21),
    band('I', 730, 880, 0.45),
    band('u', 320, 395, null),
    band('g', 400, 550, null),
    band('r', 560, 695, null),
    band('i', 690, 820, null),
    band('z', 825, 965, null),
    band('Y', 970, 1070, null),
    band('J', 1170, 1330, 0.91),
    band('H', 1490, 1780, 1.39),
    band('Ks', 1990, 2300, 1.85),
  ],
  spectrum: {
    wavelengthsNm,
    fluxDensitiesJy: wavelengthsNm.map((wavelength) => (wavelength < breakNm ? 0 : fluxJy)),
    unabsorbedFluxDensitiesJy: wavelengthsNm.map((wavelength) => (wavelength < 729.6 ? 0 : fluxJy)),
    label: 'Power law, β = −2',
    source: 'a power law; intergalactic hydrogen: Inoue et al. 2014, MNRAS 442, 1805',
    validLowNm: 300,
    validHighNm: 2500,
  },
  lines: [
    line('lyman-alpha', 'Lyα', 121.567, 'gap', 'water vapour'),
    line('si-iv', 'Si IV', 139.676, 'window', 'J', ['J']),
    line('c-iv', 'C IV', 154.9, 'window', 'J', ['J']),
    line('he-ii', 'He II', 164.042, 'window', 'J', ['J']),
    line('o-iii-uv', 'O III]', 166.615, 'gap', 'water vapour'),
    line('c-iii', 'C III]', 190.768, 'window', 'H', ['H']),
    line('mg-ii', 'Mg II', 279.912, 'window', 'Ks', ['Ks']),
    line('o-ii', '[O II]', 372.849, 'outside', 'thermal infrared'),
    line('h-beta', 'Hβ', 486.268, 'outside', 'thermal infrared'),
    line('o-iii', '[O III]', 500.824, 'outside', 'thermal infrared'),
  ],
  atmosphere: [
    { label: 'optical', kind: 'window', lowNm: 320, highNm: 930 },
    { label: 'water', kind: 'gap', lowNm: 930, highNm: 970 },
    { label: 'Y', kind: 'window', lowNm: 970, highNm: 1110 },
    { label: 'water', kind: 'gap', lowNm: 1110, highNm: 1170 },
    { label: 'J', kind: 'window', lowNm: 1170, highNm: 1330 },
    { label: 'water', kind: 'gap', lowNm: 1330, highNm: 1490 },
    { label: 'H', kind: 'window', lowNm: 1490, highNm: 1780 },
    { label: 'water', kind: 'gap', lowNm: 1780, highNm: 1990 },
    { label: 'K', kind: 'window', lowNm: 1990, highNm: 2400 },
  ],
  image: {
    halfLightRadiusArcsec: 0.1066,
    halfLightRadiusKpc: 0.569,
    halfLightRadiusAfterSeeingArcsec: 0.2902,
    seeingFwhmArcsec: 0.5399,
    meanSurfaceBrightnessAbMagPerArcsec2: 22.773,
    effectiveSurfaceBrightnessAbMagPerArcsec2: 23.471,
    centralSurfaceBrightnessAbMagPerArcsec2: 21.649,
    restSurfaceBrightnessAbMagPerArcsec2: 16.0,
    regime: 'point',
    source: 'Shibuya, Ouchi & Harikane 2015, ApJS 219, 15',
  },
  uncertainty: {
    seed: 1,
    sampleCount: 2000,
    redshift: { p16: 6.71, p50: 6.98, p84: 7.24 },
    magnitudeAb: { p16: 25.91, p50: 25.98, p84: 26.06 },
    noLightProbability: 0.12,
    probabilityError: 0.011,
    luminosityDistanceMpc: { p16: 67121, p50: 70254, p84: 73317 },
    kpcPerArcsec: { p16: 5.22, p50: 5.35, p84: 5.48 },
    lines: [
      {
        lineId: 'lyman-alpha',
        label: 'Lyα',
        observedWavelengthNm: { p16: 937.3, p50: 970.1, p84: 1001.7 },
        insideBandProbability: 0.64,
        insideWindowProbability: 0.52,
      },
    ],
    distribution: {
      redshifts,
      densities: redshifts.map((redshift) => 0.88 * bell(redshift, 7, 0.27) + 0.12 * bell(redshift, 1.7, 0.12)),
      peaks: [
        { redshift: 7, probability: 0.88 },
        { redshift: 1.7, probability: 0.12 },
      ],
    },
    magnitudeHistogram: {
      edges: Array.from({ length: 13 }, (_, index) => 25.68 + 0.05 * index),
      counts: [12, 44, 98, 176, 271, 322, 318, 261, 160, 70, 22, 6],
    },
  },
  cosmologies: [
    ['planck18', 'Planck 2018', 49.2407, 5.33996, 0.7606],
    ['planck15', 'Planck 2015', 49.2434, 5.34659, 0.7623],
    ['wmap9', 'WMAP nine-year', 49.2498, 5.36222, 0.7732],
    ['conv70', 'Convention 70 / 0.3 / 0.7', 49.1949, 5.22847, 0.7508],
    ['ladder73', 'Distance ladder 73.04', 49.1026, 5.01086, 0.7196],
  ].map(([cosmologyId, title, modulus, kpcPerArcsec, ageGyr]) => {
    const delta = Number(modulus) - 49.2407;
    return {
      cosmologyId: String(cosmologyId),
      title: String(title),
      isChosen: cosmologyId === 'planck18',
      distanceModulusMag: Number(modulus),
      deltaDistanceModulusMag: delta,
      magnitudeAb: abMagnitude + delta,
      absoluteMagnitudeAb: -21,
      kpcPerArcsec: Number(kpcPerArcsec),
      ageGyr: Number(ageGyr),
      skyLimitedTimeFactor: 10 ** (0.8 * delta),
    };
  }),
  suggestions: [
    {
      id: 'luminosity-function-knee',
      title: 'Knee of the ultraviolet luminosity function',
      valueText: 'M* = −21.15 AB at 160 nm',
      value: -21.15,
      unit: 'mag AB',
      spreadText: '± 0.13 mag',
      source: 'Bouwens et al. 2021, AJ 162, 47, table 5',
      provenance: 'published',
      validText: 'z 1.7 to 9.3; this redshift is inside',
      isExtrapolated: false,
      light: null,
      extent: null,
      velocityWidthKmS: null,
    },
  ],
  notices: [
    {
      code: 'no-light-in-bands',
      message: 'At z 7 the Lyman break falls at 0.97 µm: bands blueward of it receive no light.',
      severity: 'note',
    },
  ],
};

/** The same source looked at in the z band: a regime without light. */
export const reportWithoutLight: LightReport = {
  ...lightReport,
  ledger: {
    ...lightReport.ledger!,
    label: 'z',
    bandId: 'z',
    wavelengthNm: 891,
    steps: ledgerSteps.slice(0, 3),
    totalMagnitudeAb: null,
    reason: broken,
    aperture: null,
  },
  uncertainty: null,
};

/** A redshift without a light: distances only. */
export const reportWithoutSource: LightReport = {
  ...lightReport,
  ledger: null,
  unlensedMagnitudeAb: null,
  absoluteMagnitudeAb: null,
  bands: [],
  spectrum: null,
  uncertainty: null,
  image: {
    halfLightRadiusArcsec: null,
    halfLightRadiusKpc: null,
    halfLightRadiusAfterSeeingArcsec: null,
    seeingFwhmArcsec: 0.54,
    meanSurfaceBrightnessAbMagPerArcsec2: null,
    effectiveSurfaceBrightnessAbMagPerArcsec2: null,
    centralSurfaceBrightnessAbMagPerArcsec2: null,
    restSurfaceBrightnessAbMagPerArcsec2: null,
    regime: 'point',
    source: null,
  },
};
