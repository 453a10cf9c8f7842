import { z } from 'zod';
import { Id, Notice } from './common.js';
import { CosmologyChoice } from './cosmology.js';
import { ModeConfigurationInput } from './facilities.js';
import { Extent, Light } from './light.js';
import { MoonClass } from './semesters.js';

export const Transparency = z.enum(['clear', 'thinCloud']);
export type Transparency = z.infer<typeof Transparency>;

export const Conditions = z
  .object({
    /** Zenith seeing at 500 nm, as a seeing monitor reports it; scaled to the observing wavelength and airmass. */
    seeingArcsec: z.number({ error: 'Seeing is a number of arcseconds.' }).min(0.1).max(10),
    airmass: z.number().min(1, { error: 'Airmass is 1 at the zenith and grows from there.' }).max(10),
    moonClass: MoonClass,
    transparency: Transparency,
  })
  .meta({ id: 'Conditions' });
export type Conditions = z.infer<typeof Conditions>;

export const SignalToNoisePer = z.enum(['aperture', 'arcsec2', 'pixel', 'resolutionElement']);
export type SignalToNoisePer = z.infer<typeof SignalToNoisePer>;

const exposureSeconds = z.number().gt(0).max(86_400);
const signalToNoise = z
  .number({ error: 'A signal-to-noise ratio is a number.' })
  .gt(0, { error: 'A signal-to-noise ratio must be above 0.' })
  .max(10_000, { error: 'Signal-to-noise ratios up to 10 000 are planned here.' });

/** What an observation must reach. */
export const Goal = z
  .discriminatedUnion('kind', [
    z.object({
      kind: z.literal('signalToNoise'),
      value: signalToNoise,
      per: SignalToNoisePer,
      exposureSeconds: exposureSeconds.optional(),
    }),
    z.object({
      kind: z.literal('lineSignificance'),
      sigma: signalToNoise,
      exposureSeconds: exposureSeconds.optional(),
    }),
    /** The exposures are given and the signal-to-noise ratio is asked for. */
    z.object({
      kind: z.literal('exposureTime'),
      exposureSeconds,
      exposureCount: z.int().min(1).max(20_000),
      per: SignalToNoisePer.optional(),
    }),
  ])
  .meta({ id: 'Goal' });
export type Goal = z.infer<typeof Goal>;

/** A telescope, site and mode typed in full instead of one of the observatory's. */
export const InlineSetup = z.object({
  telescope: z
    .object({ diameterM: z.number().gt(0).max(100), obstructionDiameterM: z.number().min(0).max(100) })
    .refine((telescope) => telescope.obstructionDiameterM < telescope.diameterM, {
      path: ['obstructionDiameterM'],
      error: 'The obstruction must be smaller than the telescope.',
    }),
  site: z.object({
    zenithSeeingArcsec: z.number().min(0.1).max(10),
    outerScaleM: z.number().min(1).max(1000).optional(),
  }),
  mode: ModeConfigurationInput,
});

export const Setup = z
  .union([z.object({ modeId: Id, configurationVersion: z.int().min(1).optional() }), InlineSetup])
  .meta({ id: 'Setup' });
export type Setup = z.output<typeof Setup>;

export const EstimateRequest = z
  .object({
    cosmology: CosmologyChoice.default('planck18'),
    target: z.object({
      redshift: z
        .number({ error: 'A redshift is a number.' })
        .min(0, { error: 'A redshift below 0 has no distance.' })
        .max(30),
      light: Light,
      extent: Extent.default({ kind: 'point' }),
    }),
    setup: Setup,
    goal: Goal,
    conditions: Conditions,
    /** Radius of the photometric aperture; by default that of the best signal-to-noise ratio against sky. */
    apertureRadiusArcsec: z.number().gt(0).max(100).optional(),
    /** Spectroscopy of a continuum: the wavelength that the goal refers to. */
    wavelengthNm: z.number().gt(0).max(1e6).optional(),
  })
  .meta({ id: 'EstimateRequest' });
export type EstimateRequest = z.output<typeof EstimateRequest>;

/** One line of the light budget: its factor in magnitudes and the running total. */
export const LightStep = z
  .object({
    id: z.string(),
    stage: z.enum(['source', 'space', 'atmosphere', 'instrument', 'counting']),
    title: z.string(),
    deltaMag: z.number(),
    totalMag: z.number(),
    formula: z.string(),
    inputs: z.array(z.object({ name: z.string(), value: z.number(), unit: z.string() })),
    source: z.string(),
  })
  .meta({ id: 'LightStep' });
export type LightStep = z.infer<typeof LightStep>;

const estimateBasics = {
  engineVersion: z.string(),
  referenceDataVersion: z.string(),
  inputHash: z.string(),
  cosmologyId: z.string(),
  steps: z.array(LightStep),
  notices: z.array(Notice),
  /** Delivered, at the wavelength and airmass of the observation. */
  fwhmArcsec: z.number(),
  wavelengthNm: z.number(),
};

export const FeasibleEstimate = z
  .object({
    outcome: z.literal('feasible'),
    ...estimateBasics,
    signalToNoise: z.number(),
    signalToNoisePer: SignalToNoisePer,
    /** Of one exposure. */
    exposureSeconds: z.number(),
    exposureCount: z.int(),
    openShutterSeconds: z.number(),
    overheads: z.array(z.object({ id: z.string(), title: z.string(), seconds: z.number(), count: z.number() })),
    totalSeconds: z.number(),
    apparentMagnitudeAb: z.number(),
    apertureMagnitudeAb: z.number(),
    surfaceBrightnessAbMagPerArcsec2: z.number().nullable(),
    aperture: z.object({
      kind: z.enum(['circle', 'slit', 'patch']),
      radiusArcsec: z.number().nullable(),
      widthArcsec: z.number().nullable(),
      lengthArcsec: z.number().nullable(),
      areaArcsec2: z.number(),
      enclosedFraction: z.number(),
      pixelCount: z.number(),
    }),
    rates: z.object({
      sourceElectronsPerSecond: z.number(),
      continuumElectronsPerSecond: z.number(),
      skyElectronsPerSecond: z.number(),
      darkElectronsPerSecond: z.number(),
      skyElectronsPerSecondPerPixel: z.number(),
      peakElectronsPerSecondPerPixel: z.number(),
    }),
    peakElectronsPerPixel: z.number(),
    limitedBy: z.enum(['source', 'sky', 'dark', 'readNoise']),
    noiseShares: z.object({ source: z.number(), sky: z.number(), dark: z.number(), readNoise: z.number() }),
    exposureBounds: z.array(
      z.object({
        id: z.string(),
        side: z.enum(['upper', 'lower']),
        seconds: z.number().nullable(),
        reason: z.string(),
      }),
    ),
  })
  .meta({ id: 'FeasibleEstimate' });
export type FeasibleEstimate = z.infer<typeof FeasibleEstimate>;

/** Infeasible is an answer, with its reason; never a huge number. */
export const InfeasibleEstimate = z
  .object({
    outcome: z.literal('infeasible'),
    ...estimateBasics,
    reason: z.object({ code: z.string(), message: z.string() }),
    apparentMagnitudeAb: z.number().nullable(),
  })
  .meta({ id: 'InfeasibleEstimate' });
export type InfeasibleEstimate = z.infer<typeof InfeasibleEstimate>;

export const Estimate = z
  .discriminatedUnion('outcome', [FeasibleEstimate, InfeasibleEstimate])
  .meta({ id: 'Estimate' });
export type Estimate = z.infer<typeof Estimate>;
