import { z } from 'zod';
import { Id, Instant, Version, line, prose } from './common.js';

export const Site = z
  .object({
    name: line(120),
    latitudeDeg: z.number().min(-90).max(90),
    longitudeDegEast: z.number().min(-180).max(180),
    elevationM: z.number().min(-500).max(7000),
    timeZone: z.string(),
    /** Median of the seeing monitor: zenith, 500 nm. */
    zenithSeeingArcsec: z.number().min(0.1).max(10),
    /** Outer scale of the turbulence; without it the seeing follows Kolmogorov's law. */
    outerScaleM: z.number().min(1).max(1000).nullable(),
  })
  .meta({ id: 'Site' });
export type Site = z.infer<typeof Site>;

export const Detector = z
  .object({
    pixelScaleArcsec: z.number().gt(0).max(10),
    darkElectronsPerSecond: z.number().min(0).max(1e4),
    readNoiseElectrons: z.number().min(0).max(1e3),
    fullWellElectrons: z.number().gt(0).max(1e8),
    gainElectronsPerAdu: z.number().gt(0).max(100),
  })
  .meta({ id: 'Detector' });

export const ExposureLimits = z
  .object({ minimumExposureSeconds: z.number().gt(0).max(3600), maximumExposureSeconds: z.number().gt(0).max(36_000) })
  .meta({ id: 'ExposureLimits' });

export const Overheads = z
  .object({
    acquisitionSeconds: z.number().min(0).max(7200),
    setupSeconds: z.number().min(0).max(7200),
    readoutSeconds: z.number().min(0).max(600),
    ditherSeconds: z.number().min(0).max(600),
    /** Longest stretch before the target is acquired again. */
    maximumBlockSeconds: z.number().min(60).max(86_400),
  })
  .meta({ id: 'Overheads' });

/** Where the sky level under the source is measured; it decides how much the background noise grows. */
export const SkySubtraction = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('wideArea') }),
  z.object({ kind: z.literal('annulus'), backgroundPixelRatio: z.number().gt(0).max(1e6) }),
  z.object({ kind: z.literal('ditheredFrames') }),
]);

const modeBase = {
  /** Short name of the band or disperser, such as `J` or `red`. */
  bandId: line(20),
  label: line(60),
  wavelengthLowNm: z.number().min(90).max(1e6),
  wavelengthHighNm: z.number().min(90).max(1e6),
  /** Everything between the telescope's aperture and the counted electron, without atmosphere and aperture or slit losses. */
  throughput: z.number().gt(0).max(1),
  extinctionMagPerAirmass: z.number().min(0).max(5),
  skyAbMagPerArcsec2: z.object({
    dark: z.number().min(0).max(30),
    grey: z.number().min(0).max(30),
    bright: z.number().min(0).max(30),
  }),
  detector: Detector,
  exposureLimits: ExposureLimits,
  overheads: Overheads,
  /** Blur of telescope and instrument, added in quadrature to the atmosphere's. */
  imageQualityFwhmArcsec: z.number().min(0).max(10).optional(),
  skySubtraction: SkySubtraction.optional(),
  /** Fewest exposures in a series; by default 1, or 5 where the sky comes from dithered frames. */
  minimumExposureCount: z.int().min(1).max(1000).optional(),
  /** Error that no exposure time removes, as a fraction of the signal. */
  systematicErrorFraction: z.number().min(0).max(1).optional(),
};

export const ImagingMode = z.object({ kind: z.literal('imaging'), ...modeBase }).meta({ id: 'ImagingMode' });
export const SlitSpectroscopyMode = z
  .object({
    kind: z.literal('slitSpectroscopy'),
    ...modeBase,
    resolvingPower: z.number().min(10).max(1e6),
    slitWidthArcsec: z.number().gt(0).max(100),
    pixelsPerResolutionElement: z.number().min(1).max(20),
    /** Length of the extraction along the slit, in units of the delivered FWHM. */
    extractionLengthFwhm: z.number().min(0.5).max(10),
  })
  .meta({ id: 'SlitSpectroscopyMode' });

/** The versioned content of an instrument mode: all that the exposure engine needs to know of it. */
export const ModeConfiguration = z
  .discriminatedUnion('kind', [ImagingMode, SlitSpectroscopyMode])
  .meta({ id: 'ModeConfiguration' });
export type ModeConfiguration = z.infer<typeof ModeConfiguration>;

/** What a person may put in force: as {@link ModeConfiguration}, with the relations between its numbers checked. */
export const ModeConfigurationInput = ModeConfiguration.superRefine((mode, context) => {
  if (mode.wavelengthHighNm <= mode.wavelengthLowNm) {
    context.addIssue({
      code: 'custom',
      path: ['wavelengthHighNm'],
      message: 'The upper wavelength must lie above the lower one.',
    });
  }
  if (mode.exposureLimits.maximumExposureSeconds < mode.exposureLimits.minimumExposureSeconds) {
    context.addIssue({
      code: 'custom',
      path: ['exposureLimits', 'maximumExposureSeconds'],
      message: 'The longest exposure must not be shorter than the shortest.',
    });
  }
});

export const Mode = z
  .object({
    modeId: Id,
    name: z.string(),
    isOffered: z.boolean(),
    configurationVersion: z.int(),
    inForceSince: Instant,
    configuration: ModeConfiguration,
  })
  .meta({ id: 'Mode' });
export type Mode = z.infer<typeof Mode>;

export const Instrument = z
  .object({ instrumentId: Id, name: z.string(), description: z.string(), isOffered: z.boolean(), modes: z.array(Mode) })
  .meta({ id: 'Instrument' });
export type Instrument = z.infer<typeof Instrument>;

export const Telescope = z
  .object({
    telescopeId: Id,
    name: z.string(),
    diameterM: z.number(),
    obstructionDiameterM: z.number(),
    site: Site,
    /** Lowest and highest pointing, degrees above the horizon. */
    altitudeLowDeg: z.number(),
    altitudeHighDeg: z.number(),
    instruments: z.array(Instrument),
  })
  .meta({ id: 'Telescope' });
export type Telescope = z.infer<typeof Telescope>;
export const TelescopeList = z
  .object({ observatoryName: z.string(), rows: z.array(Telescope) })
  .meta({ id: 'TelescopeList' });

export const ModeConfigurationVersion = z
  .object({
    version: Version,
    createdAt: Instant,
    createdByName: z.string().nullable(),
    note: z.string(),
    configuration: ModeConfiguration,
  })
  .meta({ id: 'ModeConfigurationVersion' });
export type ModeConfigurationVersion = z.infer<typeof ModeConfigurationVersion>;
export const ModeConfigurationHistory = z
  .object({ rows: z.array(ModeConfigurationVersion) })
  .meta({ id: 'ModeConfigurationHistory' });

export const NewModeConfiguration = z
  .object({ configuration: ModeConfigurationInput, note: prose(2000) })
  .meta({ id: 'NewModeConfiguration' });
export type NewModeConfiguration = z.output<typeof NewModeConfiguration>;
