import type { LedgerInput, LedgerStage, LedgerStep, NoLight, SourceLight } from '@faintward/photometry';

/**
 * What an estimate is made from, and what it answers: plain data, so that it can be stored, hashed and sent.
 *
 * Every quantity carries its unit in its name. Wavelengths are vacuum, as observed unless the name says `rest`.
 * Magnitudes are AB. Angles on the sky are arcseconds. Fields marked optional state their default.
 */

/**
 * What the estimate needs to know about distances. Every model of `@faintward/cosmology` fulfils it; for long lists
 * `tabulatedDistances` is quicker. Sizes follow from D_A = D_L / (1 + z)², whatever the curvature.
 */
export interface DistanceModel {
  /** Luminosity distance in Mpc. */
  luminosityDistanceMpc(redshift: number): number;
}

// ---------------------------------------------------------------------------------------------- where and with what

export interface Site {
  /** Seeing a seeing monitor would report: zenith, 500 nm, infinite outer scale. Used when the conditions give none. */
  zenithSeeingArcsec: number;
  /** Outer scale of the turbulence in metres. Absent: infinite (Kolmogorov), which is pessimistic in the infrared. */
  outerScaleM?: number;
}

export interface Telescope {
  diameterM: number;
  /** Diameter of the central hole or secondary; 0 for none. */
  obstructionDiameterM: number;
}

export type MoonClass = 'dark' | 'grey' | 'bright';
export type Transparency = 'clear' | 'thinCloud';

/** Sky brightness as seen from the ground (no extinction is applied to it), AB mag/arcsec², per moon class. */
export type SkyBrightness = Record<MoonClass, number>;

export interface Detector {
  pixelScaleArcsec: number;
  darkElectronsPerSecond: number;
  /** Effective read noise of the read mode in use, e⁻ rms per pixel and exposure. */
  readNoiseElectrons: number;
  fullWellElectrons: number;
  /** Given: digitisation noise (gain · 0.289)² is added to the read noise variance. Absent: neglected. */
  gainElectronsPerAdu?: number;
}

export interface ExposureLimits {
  minimumExposureSeconds: number;
  /** Longest single exposure allowed: cosmic rays, changing sky, guiding, whichever the observatory finds first. */
  maximumExposureSeconds: number;
}

export interface Overheads {
  /** Pointing and putting the target in place; paid again at the start of every block. */
  acquisitionSeconds: number;
  /** Filter, disperser and read mode; paid once. */
  setupSeconds: number;
  /** After every exposure. */
  readoutSeconds: number;
  /** After every exposure; 0 when the telescope does not move between exposures. */
  ditherSeconds: number;
  /** Longest run of exposures before the target has to be acquired again. */
  maximumBlockSeconds: number;
}

/**
 * Where the sky level under the source comes from; it decides how much the background noise grows.
 * - `wideArea`: from so many pixels that its own noise does not count (factor 1; the default);
 * - `annulus`: from `backgroundPixelRatio` times as many pixels as the aperture holds (factor 1 + 1/ratio);
 * - `ditheredFrames`: from the other N − 1 exposures of the series (factor 1 + 1/(N − 1)).
 */
export type SkySubtraction =
  { kind: 'wideArea' } | { kind: 'annulus'; backgroundPixelRatio: number } | { kind: 'ditheredFrames' };

interface ModeBasics {
  bandId: string;
  label: string;
  /** Edges of the passband (imaging) or of the recorded range (spectroscopy). */
  wavelengthLowNm: number;
  wavelengthHighNm: number;
  /** End to end, detector included; without atmosphere, aperture and slit. Above 0, at most 1. */
  throughput: number;
  extinctionMagPerAirmass: number;
  skyAbMagPerArcsec2: SkyBrightness;
  detector: Detector;
  exposureLimits: ExposureLimits;
  overheads: Overheads;
  /** Blur of telescope and instrument, diffraction included, added in quadrature to the atmosphere. Default 0. */
  imageQualityFwhmArcsec?: number;
  skySubtraction?: SkySubtraction;
  /** Fewest exposures in a series. Default 1, or 5 with sky from dithered frames. */
  minimumExposureCount?: number;
  /** Error that no exposure time removes, as a fraction of the signal: S/N never exceeds its inverse. Default 0. */
  systematicErrorFraction?: number;
}

export interface ImagingMode extends ModeBasics {
  kind: 'imaging';
}

export interface SlitSpectroscopyMode extends ModeBasics {
  kind: 'slitSpectroscopy';
  /** λ/δλ with δλ the FWHM of the line-spread function. */
  resolvingPower: number;
  slitWidthArcsec: number;
  /** Detector pixels per δλ along the dispersion. */
  pixelsPerResolutionElement: number;
  /** Length extracted along the slit, in units of the delivered FWHM of the source. */
  extractionLengthFwhm: number;
}

export type InstrumentMode = ImagingMode | SlitSpectroscopyMode;

// ---------------------------------------------------------------------------------------------------- what is observed

export interface PointExtent {
  kind: 'point';
}

/** Give exactly one of the two half-light radii (along the major axis). */
export interface SersicExtent {
  kind: 'sersic';
  halfLightRadiusKpc?: number;
  halfLightRadiusArcsec?: number;
  /** Sérsic index n, 0.3 to 8. */
  index: number;
  /** Minor over major axis. Default 1. */
  axisRatio?: number;
}

/** A patch of constant surface brightness: the light is then per arcsec². */
export interface UniformExtent {
  kind: 'uniform';
  /** Solid angle that is summed for a goal per aperture when imaging. Default 1. */
  areaArcsec2?: number;
}

export type Extent = PointExtent | SersicExtent | UniformExtent;

export interface Target {
  /** Cosmological redshift, ≥ 0; at least 1e-6 where a distance or a kpc size is needed. */
  redshift: number;
  /** Per arcsec² when the extent is `uniform`. */
  light: SourceLight;
  extent: Extent;
}

export interface Conditions {
  /** Zenith seeing at 500 nm. Absent: the site's. */
  seeingArcsec?: number;
  airmass: number;
  moonClass: MoonClass;
  transparency: Transparency;
}

/** What a signal-to-noise ratio refers to. */
export type SignalToNoisePer = 'aperture' | 'arcsec2' | 'pixel' | 'resolutionElement';

export interface SignalToNoiseGoal {
  kind: 'signalToNoise';
  value: number;
  per: SignalToNoisePer;
  /** Length of each exposure. Absent: chosen between the bounds. */
  exposureSeconds?: number;
}

/** The integrated line must stand out by so many sigma (at a known wavelength). */
export interface LineSignificanceGoal {
  kind: 'lineSignificance';
  sigma: number;
  exposureSeconds?: number;
}

/** The exposures are given and the S/N is asked for. */
export interface ExposureTimeGoal {
  kind: 'exposureTime';
  /** Length of each exposure. */
  exposureSeconds: number;
  exposureCount: number;
  /** Default `aperture`. */
  per?: SignalToNoisePer;
}

export type Goal = SignalToNoiseGoal | LineSignificanceGoal | ExposureTimeGoal;

export interface EstimateLimits {
  /** Default 20,000. */
  maximumExposureCount?: number;
  /** Default: all the night hours of a semester, see `SEMESTER_NIGHT_SECONDS`. */
  maximumTotalSeconds?: number;
}

/** Everything one estimate depends on, apart from `ENGINE_VERSION`. */
export interface EstimateInput {
  target: Target;
  cosmology: DistanceModel;
  site: Site;
  telescope: Telescope;
  mode: InstrumentMode;
  goal: Goal;
  conditions: Conditions;
  /** Radius of the circular photometric aperture. Absent: the radius of best S/N against sky. Imaging only. */
  apertureRadiusArcsec?: number;
  /** Spectroscopy of a continuum: the wavelength the goal refers to. Absent: the geometric middle of the range. */
  wavelengthNm?: number;
  limits?: EstimateLimits;
}

// ------------------------------------------------------------------------------------------------------------ the answer

/** A line of the light budget; those up to the top of the atmosphere are photometry's. */
export type LightStep = LedgerStep;
export type StepStage = LedgerStage;
export type StepInput = LedgerInput;

/** The steps from the top of the atmosphere to the detector. */
export type StepId =
  | 'atmospheric-extinction'
  | 'thin-cloud'
  | 'throughput'
  | 'aperture'
  | 'slit'
  | 'extraction'
  | 'solid-angle'
  | 'goal-share'
  | 'collecting';

export interface Aperture {
  kind: 'circle' | 'slit' | 'patch';
  /** Circle only. */
  radiusArcsec: number | null;
  /** Slit only. */
  widthArcsec: number | null;
  /** Slit only: extracted length. */
  lengthArcsec: number | null;
  areaArcsec2: number;
  /** Fraction of the source's light inside; 1 for a patch. */
  enclosedFraction: number;
  /** Pixels that add their noise to the goal's sum. */
  pixelCount: number;
}

/** Electrons per second in the sum that the goal refers to. */
export interface ElectronRates {
  sourceElectronsPerSecond: number;
  /** Continuum under a line: noise without signal. */
  continuumElectronsPerSecond: number;
  skyElectronsPerSecond: number;
  darkElectronsPerSecond: number;
  /** In one pixel. */
  skyElectronsPerSecondPerPixel: number;
  /** Brightest pixel: source, sky and dark together. */
  peakElectronsPerSecondPerPixel: number;
}

/** Shares of the noise variance; they add to 1. */
export interface NoiseShares {
  source: number;
  sky: number;
  dark: number;
  readNoise: number;
}

export type NoiseKind = keyof NoiseShares;

export interface Overhead {
  id: 'acquisition' | 'setup' | 'readout' | 'dither';
  title: string;
  seconds: number;
  /** How often it is paid. */
  count: number;
}

/** Limits on the length of one exposure; the shortest upper one and the longest lower one decide. */
export interface ExposureBound {
  id: 'saturation' | 'maximumExposure' | 'readNoise' | 'minimumExposure';
  side: 'upper' | 'lower';
  /** `null`: no such limit (nothing would ever saturate; no sky to compare the read noise with). */
  seconds: number | null;
  reason: string;
}

export type WarningCode =
  | 'sourceFarBelowSky'
  | 'readNoiseLimited'
  | 'fewExposures'
  | 'nearSaturation'
  | 'highAirmass'
  | 'slitNarrowerThanSeeing'
  | 'extendedBeyondModel'
  | 'undersampled'
  | 'outerScaleOutsideModel'
  | 'apertureSmallerThanPixel'
  | 'longRequest';

export interface EstimateWarning {
  /** Of this engine, or of the light: a spectrum's own cautions. */
  code: WarningCode | (string & {});
  message: string;
}

export type InfeasibleCode =
  | NoLight['code']
  | 'wavelengthOutsideBand'
  | 'saturatesAtMinimumExposure'
  | 'exposureSaturates'
  | 'signalToNoiseUnreachable'
  | 'tooManyExposures'
  | 'longerThanSemester';

export interface InfeasibleReason {
  code: InfeasibleCode;
  message: string;
}

interface EstimateBasics {
  engineVersion: string;
  /** The light budget, in order. For an infeasible estimate: as far as the light got. */
  steps: LightStep[];
  warnings: EstimateWarning[];
  /** Delivered FWHM of a point source at the wavelength and airmass of the observation. */
  fwhmArcsec: number;
  wavelengthNm: number;
}

export interface FeasibleEstimate extends EstimateBasics {
  outcome: 'feasible';
  /** Delivered, in the sense of the goal's `per`. */
  signalToNoise: number;
  signalToNoisePer: SignalToNoisePer;
  /** Each exposure. */
  exposureSeconds: number;
  exposureCount: number;
  openShutterSeconds: number;
  overheads: Overhead[];
  totalSeconds: number;
  /** Above the atmosphere, averaged over the band; of a line: of its light spread over the band or resolution element. */
  apparentMagnitudeAb: number;
  /** The light that is counted, as a magnitude: after atmosphere, throughput, aperture or slit. */
  apertureMagnitudeAb: number;
  /** Mean surface brightness inside the half-light radius, before seeing; `null` for a point source. */
  surfaceBrightnessAbMagPerArcsec2: number | null;
  aperture: Aperture;
  rates: ElectronRates;
  /** Brightest pixel at the end of one exposure. */
  peakElectronsPerPixel: number;
  limitedBy: NoiseKind;
  noiseShares: NoiseShares;
  exposureBounds: ExposureBound[];
}

export interface InfeasibleEstimate extends EstimateBasics {
  outcome: 'infeasible';
  reason: InfeasibleReason;
  /** `null` when no light arrives. */
  apparentMagnitudeAb: number | null;
}

export type Estimate = FeasibleEstimate | InfeasibleEstimate;
