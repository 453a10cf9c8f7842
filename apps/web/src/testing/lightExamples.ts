import type { LightReport, LightSuggestion, ObservedLine, StoredSpectrum } from '@faintward/contracts/light-report';
import { Light } from '@faintward/contracts/light';
import { id } from './examples';

/** Invented answers about light, whole enough for the contracts. */
export function aLine(change: Partial<ObservedLine> = {}): ObservedLine {
  return {
    lineId: 'lymanAlpha',
    label: 'Lyα',
    restWavelengthNm: 121.567,
    observedWavelengthNm: 987.12,
    observedAirWavelengthNm: 986.85,
    bandIds: ['Y'],
    place: 'window',
    placeLabel: 'Y',
    fluxErgSCm2: null,
    observedEquivalentWidthNm: null,
    ...change,
  };
}

export function aSuggestion(change: Partial<LightSuggestion> = {}): LightSuggestion {
  return {
    id: 'knee',
    title: 'Knee of the luminosity function',
    valueText: 'M* = −20.9 AB at 160 nm',
    value: -20.9,
    unit: 'mag',
    spreadText: '± 0.3 mag',
    source: 'An invented survey',
    provenance: 'published',
    validText: 'z 2 to 9.',
    isExtrapolated: false,
    light: Light.parse({ kind: 'absoluteMagnitude', magnitude: -20.9, restWavelengthNm: 160 }),
    extent: null,
    velocityWidthKmS: null,
    ...change,
  };
}

export function aSpectrum(change: Partial<StoredSpectrum> = {}): StoredSpectrum {
  return {
    spectrumId: id(90),
    name: 'Stack of twelve',
    source: '',
    pointCount: 1200,
    restLowNm: 91.2,
    restHighNm: 400,
    observedAtRedshift: 0,
    usedByCount: 0,
    contentHash: 'abc',
    createdAt: '2027-03-01T00:00:00Z',
    notices: [],
    ...change,
  };
}

/** Of a source at z 7.12 of which nothing but its redshift is known. */
export function aLightReport(change: Partial<LightReport> = {}): LightReport {
  return {
    cosmologyId: 'planck18',
    cosmologyTitle: 'Planck 2018',
    engineVersion: '0.1.0',
    referenceDataVersion: '2026-12',
    inputHash: 'abcdef0123456789',
    redshift: 7.12,
    distances: {
      redshift: 7.12,
      comovingDistanceMpc: 8856,
      transverseComovingDistanceMpc: 8856,
      angularDiameterDistanceMpc: 1090.6,
      luminosityDistanceMpc: 71_909,
      distanceModulusMag: 49.284,
      kpcPerArcsec: 5.287,
      comovingVolumeMpc3: 2.9e12,
      lookbackTimeGyr: 13.04,
      ageGyr: 0.746,
      hubbleKmSMpc: 881,
      criticalDensityGCm3: 1.46e-27,
      bolometricDimmingMag: 9.096,
      perFrequencyDimmingMag: 6.822,
      perWavelengthDimmingMag: 11.37,
      photonRateDimmingMag: 6.822,
    },
    ledger: null,
    unlensedMagnitudeAb: null,
    absoluteMagnitudeAb: null,
    bands: [],
    spectrum: null,
    lines: [],
    atmosphere: [],
    image: {
      halfLightRadiusArcsec: null,
      halfLightRadiusKpc: null,
      halfLightRadiusAfterSeeingArcsec: null,
      seeingFwhmArcsec: 0.8,
      meanSurfaceBrightnessAbMagPerArcsec2: null,
      effectiveSurfaceBrightnessAbMagPerArcsec2: null,
      centralSurfaceBrightnessAbMagPerArcsec2: null,
      restSurfaceBrightnessAbMagPerArcsec2: null,
      regime: 'point',
      source: null,
    },
    uncertainty: null,
    cosmologies: [],
    suggestions: [],
    notices: [],
    ...change,
  };
}
