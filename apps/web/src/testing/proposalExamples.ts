import type { Observation } from '@faintward/contracts/observations';
import type { Proposal, ProposalAbilities } from '@faintward/contracts/proposals';
import type { Telescope } from '@faintward/contracts/facilities';
import { Light } from '@faintward/contracts/light';
import type { Target } from '@faintward/contracts/targets';
import { id, infeasible } from './examples';

/** Invented parts of one proposal, whole enough for the contracts. */
export function aProposal(abilities: Partial<ProposalAbilities> = {}): Proposal {
  return {
    proposalId: id(50),
    label: '27B-014',
    title: 'Dust in two galaxies',
    abstract: '',
    keywords: [],
    state: 'draft',
    semesterId: id(1),
    semesterName: 'Oct 2027 to Mar 2028',
    deadlineAt: '2099-03-31T18:00:00Z',
    siteTimeZone: 'America/Santiago',
    panelId: null,
    panelName: null,
    partnerId: null,
    partnerName: null,
    cosmology: 'planck18',
    principalName: 'Maddalena Orlandi',
    sections: [],
    requestedHours: { dark: 0, grey: 0, bright: 0 },
    award: null,
    abilities: {
      canEditTargets: true,
      canEditEverything: true,
      canManageTeam: true,
      canSubmit: true,
      canWithdraw: false,
      ...abilities,
    },
    version: 1,
    updatedAt: '2027-03-01T00:00:00Z',
  };
}

export function aTarget(change: Partial<Target> = {}): Target {
  return {
    targetId: id(60),
    position: 1,
    name: 'CLR J0215−0409',
    rightAscensionDeg: 33.878,
    declinationDeg: -4.154,
    rightAscensionText: '02 15 30.77',
    declinationText: '−04 09 13.8',
    redshift: 7.12,
    redshiftUncertainty: null,
    redshiftUncertaintyText: '',
    redshiftKind: 'spectroscopic',
    light: Light.parse({ kind: 'apparentMagnitude', magnitude: 26, bandId: 'J' }),
    brightnessText: '26.00 AB (J)',
    extent: { kind: 'point' },
    notes: '',
    computed: {
      luminosityDistanceMpc: 71_909,
      angularDiameterDistanceMpc: 1090.6,
      distanceModulusMag: 49.284,
      kpcPerArcsec: 5.287,
      ageGyr: 0.746,
      lookbackTimeGyr: 13.04,
      perFrequencyDimmingMag: 6.82,
      bolometricDimmingMag: 9.1,
      apparentMagnitudeAb: 26,
      magnitudeLabel: 'J',
      absoluteMagnitudeAb: -21.01,
      bandMagnitudesAb: { g: null, r: null, i: null, z: null, Y: null, J: 26, H: 26.01, Ks: 26.02 },
      lineObservedWavelengthNm: null,
      lineFluxErgSCm2: null,
      halfLightRadiusArcsec: null,
      surfaceBrightnessAbMagPerArcsec2: null,
      upSummary: 'Oct–Jan',
      upHoursByMonth: [{ month: '2027-10', hoursPerNight: 6.2 }],
      notices: [],
      cosmologyId: 'planck18',
      engineVersion: '0.1.0',
      referenceDataVersion: '2026-12',
      inputHash: 'abcdef0123456789',
    },
    observationCount: 0,
    requestedSeconds: null,
    version: 3,
    updatedAt: '2027-03-01T00:00:00Z',
    ...change,
  };
}

export function anObservation(change: Partial<Observation> = {}): Observation {
  return {
    observationId: id(70),
    targetId: id(60),
    targetName: 'CLR J0215−0409',
    redshift: 7.12,
    modeId: id(80),
    modeName: 'J imaging',
    instrumentName: 'Kiln',
    telescopeName: 'Lumbre',
    configurationVersion: 1,
    goal: { kind: 'signalToNoise', value: 5, per: 'aperture' },
    conditions: { seeingArcsec: 0.8, airmass: 1.2, moonClass: 'dark', transparency: 'clear' },
    repeatCount: 1,
    estimate: infeasible,
    totalSeconds: null,
    lacking: null,
    version: 2,
    updatedAt: '2027-03-01T00:00:00Z',
    ...change,
  };
}

export const telescope: Telescope = {
  telescopeId: id(2),
  name: 'Lumbre',
  diameterM: 5,
  obstructionDiameterM: 1.2,
  site: {
    name: 'Cerro Lumbre',
    latitudeDeg: -27.85,
    longitudeDegEast: -69.95,
    elevationM: 3180,
    timeZone: 'America/Santiago',
    zenithSeeingArcsec: 0.8,
    outerScaleM: null,
  },
  altitudeLowDeg: 30,
  altitudeHighDeg: 88,
  instruments: [
    {
      instrumentId: id(81),
      name: 'Kiln',
      description: '',
      isOffered: true,
      modes: [
        {
          modeId: id(80),
          name: 'J imaging',
          isOffered: true,
          configurationVersion: 1,
          inForceSince: '2027-01-01T00:00:00Z',
          configuration: {
            kind: 'imaging',
            bandId: 'J',
            label: 'J',
            wavelengthLowNm: 1170,
            wavelengthHighNm: 1330,
            throughput: 0.4,
            extinctionMagPerAirmass: 0.08,
            skyAbMagPerArcsec2: { dark: 16.5, grey: 16.4, bright: 16.2 },
            detector: {
              pixelScaleArcsec: 0.15,
              darkElectronsPerSecond: 0.02,
              readNoiseElectrons: 6,
              fullWellElectrons: 90_000,
              gainElectronsPerAdu: 2,
            },
            exposureLimits: { minimumExposureSeconds: 2, maximumExposureSeconds: 300 },
            overheads: {
              acquisitionSeconds: 300,
              setupSeconds: 60,
              readoutSeconds: 4,
              ditherSeconds: 8,
              maximumBlockSeconds: 7200,
            },
          },
        },
      ],
    },
  ],
};
