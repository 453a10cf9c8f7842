import { Light } from '@faintward/contracts/light';
import type { Observation } from '@faintward/contracts/observations';
import type { SubmittedContent } from '@faintward/contracts/submissions';
import type { Target, TargetComputed } from '@faintward/contracts/targets';

/** A light as it was frozen before sources had spectra. */
type FormerLight = { sigmaMag?: number } & (
  | { kind: 'apparentMagnitude'; magnitude: number; system?: string; bandId: string; spectralSlopeBeta?: number }
  | { kind: 'absoluteMagnitude'; magnitudeAb: number; restWavelengthNm?: number; spectralSlopeBeta?: number }
  | { kind: 'lineFlux'; fluxErgSCm2: number; restWavelengthNm: number; velocityWidthKmS?: number }
  | { kind: 'lineLuminosity'; luminosityErgS: number; restWavelengthNm: number; velocityWidthKmS?: number }
);

/** A target as it was frozen before redshifts had other uncertainties than a standard deviation. */
type FormerTarget = Omit<
  Target,
  'redshiftUncertainty' | 'redshiftUncertaintyText' | 'redshiftKind' | 'light' | 'computed'
> & {
  redshiftSigma: number | null;
  light: FormerLight | null;
  computed: Omit<
    TargetComputed,
    'bandMagnitudesAb' | 'lineObservedWavelengthNm' | 'lineFluxErgSCm2' | 'referenceDataVersion'
  >;
};

/** What was computed before results named their reference data. */
const NO_REFERENCE_DATA = 'none';

/**
 * Submitted content as the contract has it today. What was frozen stays stored as it was, byte for byte, for its fingerprint to
 * hold; what it lacks is filled in from what it says when it is read. Content of today comes back as it is.
 */
export function upgradeSubmittedContent(content: SubmittedContent): SubmittedContent {
  return {
    ...content,
    targets: content.targets.map(upgradeSubmittedTarget),
    observations: content.observations.map(upgradeSubmittedObservation),
  };
}

export function upgradeSubmittedTarget(stored: Target | FormerTarget): Target {
  if ('redshiftUncertainty' in stored) return stored;
  const { redshiftSigma, light, computed, ...rest } = stored;
  const isKnown = redshiftSigma !== null && redshiftSigma > 0;
  return {
    ...rest,
    redshiftUncertainty: isKnown ? { kind: 'gaussian', sigma: redshiftSigma } : null,
    redshiftUncertaintyText: isKnown ? String(redshiftSigma) : '',
    redshiftKind: 'spectroscopic',
    light: light === null ? null : upgradeLight(light),
    computed: {
      ...computed,
      bandMagnitudesAb: {},
      lineObservedWavelengthNm: null,
      lineFluxErgSCm2: null,
      referenceDataVersion: NO_REFERENCE_DATA,
    },
  };
}

export function upgradeSubmittedObservation(stored: Observation): Observation {
  const { estimate } = stored;
  if (estimate === null || 'referenceDataVersion' in estimate) return stored;
  return {
    ...stored,
    estimate: { ...(estimate as object), referenceDataVersion: NO_REFERENCE_DATA } as typeof estimate,
  };
}

/** As the migration of stored targets does it: every default is what it meant then. */
function upgradeLight(former: FormerLight): Light {
  if (former.kind === 'lineFlux' || former.kind === 'lineLuminosity') return Light.parse(former);
  const { spectralSlopeBeta: slopeBeta, ...rest } = former;
  const spectrum = { kind: 'powerLaw', ...(slopeBeta === undefined ? {} : { slopeBeta }) };
  if (rest.kind === 'apparentMagnitude') return Light.parse({ ...rest, spectrum });
  const { magnitudeAb, ...absolute } = rest;
  return Light.parse({ ...absolute, magnitude: magnitudeAb, spectrum });
}
