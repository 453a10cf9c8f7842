import { z } from 'zod';
import { Id } from './common.js';
import { CosmologyChoice } from './cosmology.js';

/** Bands a brightness may be quoted in; their curves are reference data. Instruments bring their own. */
export const BandId = z.enum(['U', 'B', 'V', 'R', 'I', 'u', 'g', 'r', 'i', 'z', 'Y', 'J', 'H', 'Ks']);
export type BandId = z.infer<typeof BandId>;

export const MagnitudeSystem = z.enum(['AB', 'Vega']);
export type MagnitudeSystem = z.infer<typeof MagnitudeSystem>;

const magnitude = z.number({ error: 'A magnitude is a number.' }).min(-60).max(60);
/** Slope β of f_λ ∝ λ^β; −2 is flat per unit frequency. */
const slopeBeta = z.number({ error: 'A slope is a number.' }).min(-10).max(10).default(-2);
const restWavelengthNm = z.number({ error: 'A wavelength is a number.' }).min(1).max(1e6);
const velocityWidthKmS = z.number().min(0).max(30_000).default(200);
const restEquivalentWidthNm = z.number().min(0).max(1000).default(0);

/** The shape of a source's spectrum in its rest frame. How bright it is says {@link Light}. */
export const Spectrum = z
  .discriminatedUnion('kind', [
    z.object({
      kind: z.literal('powerLaw'),
      slopeBeta,
      /** Part of the light below the Lyman limit that leaves the galaxy. */
      escapeFraction: z.number().min(0).max(1).default(0),
    }),
    z.object({
      kind: z.literal('starForming'),
      /** In the ultraviolet. */
      slopeBeta,
      /** f_ν above over below the Balmer and 4000 Å breaks: 1 none, 1.1 young, 2 old. */
      breakRatio: z.number().min(1).max(4).default(1.2),
      /** Rest equivalent widths of the lines it is drawn with. */
      lymanAlphaNm: restEquivalentWidthNm,
      oxygenIINm: restEquivalentWidthNm,
      /** [O III] 4960 and 5008 with Hβ, together. */
      oxygenIIIHydrogenBetaNm: restEquivalentWidthNm,
      hydrogenAlphaNm: restEquivalentWidthNm,
    }),
    /** Old stars, no lines; approximate. */
    z.object({ kind: z.literal('passive') }),
    z.object({
      kind: z.literal('quasar'),
      /** Two power laws with lines, or a published composite. */
      template: z.enum(['powerLaws', 'hewettWild2010']).default('powerLaws'),
    }),
    z.object({
      kind: z.literal('supernovaIa'),
      /** Rest-frame days from the maximum in B. */
      phaseDays: z.number().min(-15).max(60).default(0),
    }),
    z.object({ kind: z.literal('blackbody'), temperatureK: z.number().min(100).max(1e6) }),
    /** A spectrum that was uploaded to the proposal. */
    z.object({ kind: z.literal('uploaded'), spectrumId: Id }),
  ])
  .meta({ id: 'Spectrum' });
export type Spectrum = z.infer<typeof Spectrum>;

export const DustLaw = z.enum(['calzetti2000', 'ccm1989', 'fitzpatrick1999']);
export type DustLaw = z.infer<typeof DustLaw>;

const colourExcessMag = z
  .number({ error: 'A colour excess is a number.' })
  .min(0, { error: 'A colour excess is 0 or more.' })
  .max(10);

export const HostDust = z
  .object({
    law: DustLaw.default('calzetti2000'),
    colourExcessMag,
    /** A(V) / E(B−V); by default that of the law. */
    totalToSelective: z.number().min(2).max(6).nullable().default(null),
  })
  .meta({ id: 'HostDust' });
export type HostDust = z.infer<typeof HostDust>;

export const GalacticDust = z
  .object({
    colourExcessMag,
    /** A value read off the SFD map is 14 % high and is rescaled; a true one is taken as it is. */
    scale: z.enum(['sfd', 'true']).default('sfd'),
    law: z.enum(['fitzpatrick1999', 'ccm1989']).default('fitzpatrick1999'),
  })
  .meta({ id: 'GalacticDust' });
export type GalacticDust = z.infer<typeof GalacticDust>;

/** Mean transmission of the intergalactic medium. */
export const IntergalacticModel = z.enum(['inoue2014', 'madau1995', 'none']);
export type IntergalacticModel = z.infer<typeof IntergalacticModel>;

/** What the value given already contains. What it does not contain is applied on top of it. */
const includes = (defaults: { hostDust: boolean; galacticDust: boolean; lensing: boolean }) =>
  z.object({ hostDust: z.boolean(), galacticDust: z.boolean(), lensing: z.boolean() }).default(defaults);
const asSeen = includes({ hostDust: true, galacticDust: true, lensing: true });
const asEmitted = includes({ hostDust: true, galacticDust: false, lensing: false });
const beforeDust = includes({ hostDust: false, galacticDust: false, lensing: false });

const onTheWay = {
  hostDust: HostDust.nullable().default(null),
  galacticDust: GalacticDust.nullable().default(null),
  /** Lensing magnification of the total flux. */
  magnification: z.number().gt(0, { error: 'A magnification is above 0.' }).max(1e4).default(1),
  /** Its uncertainty, 1 σ of ln μ. */
  sigmaLnMagnification: z.number().min(0).max(3).optional(),
  intergalactic: IntergalacticModel.default('inoue2014'),
  /** Uncertainty of the brightness, 1 σ in magnitudes. */
  sigmaMag: z.number().min(0).max(5).optional(),
};
const spectrum = Spectrum.default({ kind: 'powerLaw', slopeBeta: -2, escapeFraction: 0 });
const line = {
  restWavelengthNm,
  velocityWidthKmS,
  /** What is seen under the line: it adds noise, not signal. */
  continuum: z
    .discriminatedUnion('kind', [
      z.object({ kind: z.literal('magnitude'), magnitudeAb: magnitude }),
      z.object({ kind: z.literal('equivalentWidth'), restEquivalentWidthNm: z.number().gt(0).max(1e5) }),
    ])
    .nullable()
    .default(null),
};
/** The cosmology that a published luminosity was derived with; null: the one in use. */
const derivedWith = CosmologyChoice.nullable().default(null);

/** How bright a target is, said in the terms the investigator knows. */
export const Light = z
  .discriminatedUnion('kind', [
    z.object({
      kind: z.literal('apparentMagnitude'),
      magnitude,
      system: MagnitudeSystem.default('AB'),
      bandId: BandId,
      spectrum,
      includes: asSeen,
      ...onTheWay,
    }),
    z.object({
      kind: z.literal('absoluteMagnitude'),
      magnitude,
      system: MagnitudeSystem.default('AB'),
      /** Rest wavelength the magnitude belongs to; 150 nm for M_UV. Not used with a band. */
      restWavelengthNm: restWavelengthNm.default(150),
      /** Band in the rest frame, instead of a wavelength. */
      restBandId: BandId.nullable().default(null),
      derivedWith,
      spectrum,
      includes: asEmitted,
      ...onTheWay,
    }),
    z.object({
      kind: z.literal('lineFlux'),
      fluxErgSCm2: z.number().gt(0).max(1),
      ...line,
      includes: asSeen,
      ...onTheWay,
    }),
    z.object({
      kind: z.literal('lineLuminosity'),
      luminosityErgS: z.number().gt(0).max(1e60),
      ...line,
      derivedWith,
      includes: asEmitted,
      ...onTheWay,
    }),
    z.object({
      kind: z.literal('starFormationRate'),
      solarMassesPerYear: z.number().gt(0).max(1e6),
      /** The published relation, which also fixes the initial mass function. */
      calibration: z.enum(['kennicutt1998', 'kennicuttEvans2012', 'madauDickinson2014']).default('kennicuttEvans2012'),
      /** Which light of the young stars is looked at. */
      tracer: z.enum(['ultraviolet', 'hydrogenAlpha', 'lymanAlpha']).default('ultraviolet'),
      /** Part of the Lyα photons that leaves the galaxy; there is no safe default. */
      escapeFraction: z.number().gt(0).max(1).nullable().default(null),
      velocityWidthKmS,
      derivedWith,
      spectrum,
      includes: beforeDust,
      ...onTheWay,
    }),
    /** What is typical of its kind at its redshift: a suggestion, never a measurement. */
    z.object({
      kind: z.literal('typical'),
      of: z.enum(['starFormingGalaxy', 'supernovaIa']),
      spectrum,
      includes: asEmitted,
      ...onTheWay,
    }),
  ])
  .meta({ id: 'Light' });
export type Light = z.output<typeof Light>;
/** As it may be sent: what has a default may be left out. */
export type LightDraftInput = z.input<typeof Light>;

/** Published relations between size and redshift. */
export const SizeRelation = z.enum(['shibuya2015', 'vanDerWel2014Late', 'vanDerWel2014Early']);
export type SizeRelation = z.infer<typeof SizeRelation>;

/** How large a target is. */
export const Extent = z
  .discriminatedUnion('kind', [
    z.object({ kind: z.literal('point') }),
    z.object({
      kind: z.literal('sersic'),
      halfLightRadius: z.number().gt(0).max(10_000),
      unit: z.enum(['kpc', 'arcsec']),
      sersicIndex: z.number().min(0.3).max(8).default(1),
      axisRatio: z.number().gt(0).max(1).default(1),
    }),
    /** The size of a published relation at its redshift: a suggestion, never a measurement. */
    z.object({
      kind: z.literal('typical'),
      relation: SizeRelation.default('shibuya2015'),
      /** For the relations by mass. */
      stellarMassSolar: z.number().min(1e6).max(1e13).default(5e10),
      sersicIndex: z.number().min(0.3).max(8).default(1.5),
      axisRatio: z.number().gt(0).max(1).default(1),
    }),
    /** A surface of even brightness: the magnitude is then per square arcsecond. */
    z.object({ kind: z.literal('uniform') }),
  ])
  .meta({ id: 'Extent' });
export type Extent = z.infer<typeof Extent>;

/** Most points of an uploaded redshift distribution. */
export const MAX_DISTRIBUTION_POINTS = 5000;

const redshiftBound = z.number({ error: 'A redshift is a number.' }).min(0).max(30);

/** How well a redshift is known. */
export const RedshiftUncertainty = z
  .discriminatedUnion('kind', [
    z.object({ kind: z.literal('gaussian'), sigma: z.number().gt(0).max(10) }),
    /** The 16th, 50th and 84th percentile, as photometric redshifts are quoted. */
    z.object({ kind: z.literal('percentiles'), p16: redshiftBound, p50: redshiftBound, p84: redshiftBound }),
    /** Probability density over redshift, linear between its points; any scale. */
    z.object({
      kind: z.literal('table'),
      redshifts: z.array(redshiftBound).min(2).max(MAX_DISTRIBUTION_POINTS),
      densities: z.array(z.number().min(0)).min(2).max(MAX_DISTRIBUTION_POINTS),
    }),
  ])
  .superRefine((uncertainty, context) => {
    if (uncertainty.kind === 'percentiles') {
      const { p16, p50, p84 } = uncertainty;
      if (!(p16 < p50 && p50 < p84)) {
        context.addIssue({ code: 'custom', path: ['p50'], message: 'The three percentiles must ascend.' });
      }
    }
    if (uncertainty.kind === 'table') {
      const { redshifts, densities } = uncertainty;
      if (redshifts.length !== densities.length) {
        context.addIssue({ code: 'custom', path: ['densities'], message: 'Give one density for each redshift.' });
      }
      const fall = redshifts.findIndex((redshift, index) => index > 0 && redshift <= redshifts[index - 1]!);
      if (fall !== -1) {
        context.addIssue({ code: 'custom', path: ['redshifts', fall], message: 'The redshifts must ascend.' });
      }
      if (densities.every((density) => density === 0)) {
        context.addIssue({ code: 'custom', path: ['densities'], message: 'Some density must be above 0.' });
      }
    }
  })
  .meta({ id: 'RedshiftUncertainty' });
export type RedshiftUncertainty = z.infer<typeof RedshiftUncertainty>;

/** Where a redshift comes from. */
export const RedshiftKind = z.enum(['spectroscopic', 'photometric', 'assumed']);
export type RedshiftKind = z.infer<typeof RedshiftKind>;
