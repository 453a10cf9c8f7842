import { z } from 'zod';
import { Id, Notice } from './common.js';
import { CosmologyChoice } from './cosmology.js';
import { DistanceRow } from './distances.js';
import { LightStep } from './estimates.js';
import { BandId, Extent, Light, RedshiftUncertainty, SizeRelation } from './light.js';

/** Most draws of one propagation of uncertainty. */
export const MAX_SAMPLE_COUNT = 20_000;

/** A light, a size and a redshift, whether or not they belong to a stored target. */
export const LightReportRequest = z
  .object({
    cosmology: CosmologyChoice.default('planck18'),
    redshift: z
      .number({ error: 'A redshift is a number.' })
      .min(0, { error: 'A redshift below 0 has no distance.' })
      .max(30, { error: 'Redshifts up to 30 are accepted for sources.' }),
    redshiftUncertainty: RedshiftUncertainty.nullable().default(null),
    light: Light.nullable().default(null),
    extent: Extent.default({ kind: 'point' }),
    /** Band of the light budget; by default the one the light is quoted in, or the nearest to it. */
    bandId: BandId.nullable().default(null),
    /** Zenith seeing at 500 nm. */
    seeingArcsec: z.number().min(0.1).max(10).default(0.8),
    /** Radius of the aperture at the end of the ledger; by default that of the best S/N against sky. */
    apertureRadiusArcsec: z.number().gt(0).max(100).nullable().default(null),
    sampleCount: z.int().min(100).max(MAX_SAMPLE_COUNT).default(2000),
    seed: z
      .int()
      .min(0)
      .max(2 ** 31)
      .default(1),
  })
  .meta({ id: 'LightReportRequest' });
export type LightReportRequest = z.output<typeof LightReportRequest>;

/** The report of a stored target takes light, size and cosmology from its proposal. */
export const TargetLightQuery = z.object({
  bandId: BandId.optional(),
  apertureRadiusArcsec: z.coerce.number().gt(0).max(100).optional(),
});
export type TargetLightQuery = z.output<typeof TargetLightQuery>;

/** Why something has no value, said instead of a huge number. */
export const NoValue = z.object({ code: z.string(), message: z.string() }).meta({ id: 'NoValue' });

/** From luminosity to the top of the atmosphere. The last total is the synthetic magnitude of the arriving spectrum. */
export const LightLedger = z
  .object({
    /** The band that is summed over, or the line. */
    label: z.string(),
    bandId: BandId.nullable(),
    wavelengthNm: z.number(),
    steps: z.array(LightStep),
    /** What the steps add up to: AB magnitude above the atmosphere; null without light. */
    totalMagnitudeAb: z.number().nullable(),
    /** A line's ledger is of its flux spread over this band; null for a continuum. */
    lineFluxErgSCm2: z.number().nullable(),
    reason: NoValue.nullable(),
    /** What an aperture of this radius takes of it in the seeing given; null without light or for an even surface. */
    aperture: z
      .object({
        radiusArcsec: z.number(),
        seeingArcsec: z.number(),
        enclosedFraction: z.number(),
        magnitudeAb: z.number(),
      })
      .nullable(),
  })
  .meta({ id: 'LightLedger' });
export type LightLedger = z.infer<typeof LightLedger>;

export const BandLight = z
  .object({
    bandId: BandId,
    label: z.string(),
    wavelengthLowNm: z.number(),
    wavelengthHighNm: z.number(),
    pivotWavelengthNm: z.number(),
    magnitudeAb: z.number().nullable(),
    /** Null also where a band has no Vega offset here. */
    magnitudeVega: z.number().nullable(),
    fluxDensityJy: z.number().nullable(),
    reason: NoValue.nullable(),
    /** Part of the light that the intergalactic medium lets through in this band; null without light. */
    intergalacticTransmission: z.number().nullable(),
  })
  .meta({ id: 'BandLight' });
export type BandLight = z.infer<typeof BandLight>;

/** Where the atmosphere lets light through, and where it does not. */
export const AtmosphericRange = z
  .object({ label: z.string(), kind: z.enum(['window', 'gap']), lowNm: z.number(), highNm: z.number() })
  .meta({ id: 'AtmosphericRange' });

export const ObservedLine = z
  .object({
    lineId: z.string(),
    label: z.string(),
    restWavelengthNm: z.number(),
    /** In vacuum. */
    observedWavelengthNm: z.number(),
    /** Null below 200 nm, where the formula is not used. */
    observedAirWavelengthNm: z.number().nullable(),
    bandIds: z.array(BandId),
    /** Where it falls: a window of the atmosphere, or a gap it does not come through. */
    place: z.enum(['window', 'gap', 'outside']),
    placeLabel: z.string(),
    /** Where the source's light says it. */
    fluxErgSCm2: z.number().nullable(),
    observedEquivalentWidthNm: z.number().nullable(),
  })
  .meta({ id: 'ObservedLine' });
export type ObservedLine = z.infer<typeof ObservedLine>;

export const LightSpectrum = z
  .object({
    /** Observed, in vacuum. */
    wavelengthsNm: z.array(z.number()),
    /** As it arrives above the atmosphere. */
    fluxDensitiesJy: z.array(z.number()),
    /** The same without intergalactic and Galactic absorption. */
    unabsorbedFluxDensitiesJy: z.array(z.number()),
    label: z.string(),
    source: z.string(),
    /** Where the recipe or table says something; nothing is drawn beyond. */
    validLowNm: z.number(),
    validHighNm: z.number(),
  })
  .meta({ id: 'LightSpectrum' });
export type LightSpectrum = z.infer<typeof LightSpectrum>;

export const LightImage = z
  .object({
    halfLightRadiusArcsec: z.number().nullable(),
    halfLightRadiusKpc: z.number().nullable(),
    /** In the seeing given, scaled to the ledger's wavelength at the zenith. */
    halfLightRadiusAfterSeeingArcsec: z.number().nullable(),
    seeingFwhmArcsec: z.number(),
    meanSurfaceBrightnessAbMagPerArcsec2: z.number().nullable(),
    effectiveSurfaceBrightnessAbMagPerArcsec2: z.number().nullable(),
    centralSurfaceBrightnessAbMagPerArcsec2: z.number().nullable(),
    /** What the same surface would show without expansion: mean surface brightness less 7.5 log10(1+z). */
    restSurfaceBrightnessAbMagPerArcsec2: z.number().nullable(),
    regime: z.enum(['point', 'resolvedBySeeing', 'extended']),
    source: z.string().nullable(),
  })
  .meta({ id: 'LightImage' });
export type LightImage = z.infer<typeof LightImage>;

/** The 16th, 50th and 84th percentile of the draws. */
export const Quantiles = z.object({ p16: z.number(), p50: z.number(), p84: z.number() }).meta({ id: 'Quantiles' });
export type Quantiles = z.infer<typeof Quantiles>;

export const LightUncertainty = z
  .object({
    seed: z.int(),
    sampleCount: z.int(),
    redshift: Quantiles,
    /** Of the ledger's magnitude, over the draws that have light there; null if none has. */
    magnitudeAb: Quantiles.nullable(),
    /** Part of the draws without light in the ledger's band. */
    noLightProbability: z.number(),
    /** Standard error of the probabilities by the number of draws. */
    probabilityError: z.number(),
    luminosityDistanceMpc: Quantiles.nullable(),
    kpcPerArcsec: Quantiles.nullable(),
    /** Of the line the light is quoted in, or of the lines commonly used. */
    lines: z.array(
      z.object({
        lineId: z.string(),
        label: z.string(),
        observedWavelengthNm: Quantiles,
        insideBandProbability: z.number(),
        insideWindowProbability: z.number(),
      }),
    ),
    /** The distribution the draws were made from, for drawing: scaled to unit area. */
    distribution: z.object({
      redshifts: z.array(z.number()),
      densities: z.array(z.number()),
      peaks: z.array(z.object({ redshift: z.number(), probability: z.number() })),
    }),
    /** A histogram of the magnitudes drawn. */
    magnitudeHistogram: z.object({ edges: z.array(z.number()), counts: z.array(z.int()) }),
  })
  .meta({ id: 'LightUncertainty' });
export type LightUncertainty = z.infer<typeof LightUncertainty>;

/** What the choice of cosmology changes for one source. */
export const SourceInCosmology = z
  .object({
    cosmologyId: z.string(),
    title: z.string(),
    isChosen: z.boolean(),
    distanceModulusMag: z.number().nullable(),
    deltaDistanceModulusMag: z.number().nullable(),
    magnitudeAb: z.number().nullable(),
    absoluteMagnitudeAb: z.number().nullable(),
    kpcPerArcsec: z.number(),
    ageGyr: z.number().nullable(),
    /** Exposure time against the chosen cosmology where the sky limits: ∝ flux⁻². 1 where the apparent light is given. */
    skyLimitedTimeFactor: z.number().nullable(),
  })
  .meta({ id: 'SourceInCosmology' });
export type SourceInCosmology = z.infer<typeof SourceInCosmology>;

/** Typical values at a redshift, from the literature: offered, labelled, never used silently. */
export const LightSuggestion = z
  .object({
    id: z.string(),
    title: z.string(),
    /** The value in words, with its unit: "M* = −21.15 AB at 160 nm". */
    valueText: z.string(),
    value: z.number(),
    unit: z.string(),
    spreadText: z.string().nullable(),
    source: z.string(),
    provenance: z.enum(['published', 'publishedFromMemory', 'commonPractice']),
    /** Where it holds, and whether this redshift is inside. */
    validText: z.string(),
    isExtrapolated: z.boolean(),
    /** What taking it up would set. */
    light: Light.nullable(),
    extent: Extent.nullable(),
    velocityWidthKmS: z.number().nullable(),
  })
  .meta({ id: 'LightSuggestion' });
export type LightSuggestion = z.infer<typeof LightSuggestion>;

export const SuggestionsQuery = z.object({
  redshift: z.coerce.number().min(0).max(30),
  relation: SizeRelation.optional(),
});
export const LightSuggestions = z.object({ rows: z.array(LightSuggestion) }).meta({ id: 'LightSuggestions' });
export type LightSuggestions = z.infer<typeof LightSuggestions>;

export const LightReport = z
  .object({
    cosmologyId: z.string(),
    cosmologyTitle: z.string(),
    engineVersion: z.string(),
    /** Of the reference data that was used; see `GET /reference-data`. */
    referenceDataVersion: z.string(),
    inputHash: z.string(),
    redshift: z.number(),
    distances: DistanceRow,
    ledger: LightLedger.nullable(),
    /** Without the magnification that the light given contains or gets; null where μ = 1 or there is no light. */
    unlensedMagnitudeAb: z.number().nullable(),
    absoluteMagnitudeAb: z.number().nullable(),
    bands: z.array(BandLight),
    spectrum: LightSpectrum.nullable(),
    lines: z.array(ObservedLine),
    atmosphere: z.array(AtmosphericRange),
    image: LightImage,
    uncertainty: LightUncertainty.nullable(),
    cosmologies: z.array(SourceInCosmology),
    suggestions: z.array(LightSuggestion),
    notices: z.array(Notice),
  })
  .meta({ id: 'LightReport' });
export type LightReport = z.infer<typeof LightReport>;

/* ---- Reading what was typed ---- */

export const LightReadingRequest = z
  .object({
    /** With its unit, typed freely: `2e-17 erg/s/cm^2`, `12 uJy`, `22.5 mag`, `-21.3 mag absolute`, `8 Msun/yr`. */
    text: z.string().max(200),
    /** What a magnitude without a band or a flux density belongs to. */
    bandId: BandId.default('V'),
    system: z.enum(['AB', 'Vega']).default('AB'),
  })
  .meta({ id: 'LightReadingRequest' });
export type LightReadingRequest = z.output<typeof LightReadingRequest>;

/** A text is read as one of these, in the unit of the field it fills. */
export const LightReading = z
  .object({
    kind: z.enum(['apparentMagnitude', 'absoluteMagnitude', 'lineFlux', 'lineLuminosity', 'starFormationRate']),
    value: z.number(),
    unit: z.string(),
    system: z.enum(['AB', 'Vega']).nullable(),
    /** How it was understood: "24.05 mag AB in J, from 0.87 µJy". */
    meaning: z.string(),
  })
  .meta({ id: 'LightReading' });
export type LightReading = z.infer<typeof LightReading>;

export const RedshiftDistributionRequest = z
  .object({ text: z.string().max(2_000_000) })
  .meta({ id: 'RedshiftDistributionRequest' });
export const RedshiftDistributionReading = z
  .object({
    uncertainty: RedshiftUncertainty,
    quantiles: Quantiles,
    peaks: z.array(z.object({ redshift: z.number(), probability: z.number() })),
    notices: z.array(Notice),
  })
  .meta({ id: 'RedshiftDistributionReading' });
export type RedshiftDistributionReading = z.infer<typeof RedshiftDistributionReading>;

/* ---- Uploaded spectra ---- */

/** Most points of an uploaded spectrum. */
export const MAX_SPECTRUM_POINTS = 50_000;

export const NewSpectrum = z
  .object({
    name: z.string().trim().min(1, { error: 'Please fill this in.' }).max(80),
    /** Two columns: wavelength and flux density; any delimiter, with or without a header. */
    text: z.string().max(5_000_000),
    wavelengthUnit: z.enum(['nm', 'angstrom', 'micron']).nullable().default(null),
    /** Per unit wavelength or frequency; the scale does not matter. */
    fluxKind: z.enum(['perWavelength', 'perFrequency']).default('perWavelength'),
    isAirWavelength: z.boolean().default(false),
    /** Redshift at which it was observed; 0 for a rest-frame spectrum. */
    observedAtRedshift: z.number().min(0).max(30).default(0),
    source: z.string().trim().max(500).default(''),
  })
  .meta({ id: 'NewSpectrum' });
export type NewSpectrum = z.output<typeof NewSpectrum>;

export const StoredSpectrum = z
  .object({
    spectrumId: Id,
    name: z.string(),
    source: z.string(),
    pointCount: z.int(),
    /** Rest frame, vacuum. */
    restLowNm: z.number(),
    restHighNm: z.number(),
    observedAtRedshift: z.number(),
    /** Targets whose light uses it. */
    usedByCount: z.int(),
    contentHash: z.string(),
    createdAt: z.iso.datetime(),
    notices: z.array(Notice),
  })
  .meta({ id: 'StoredSpectrum' });
export type StoredSpectrum = z.infer<typeof StoredSpectrum>;
export const StoredSpectrumList = z.object({ rows: z.array(StoredSpectrum) }).meta({ id: 'StoredSpectrumList' });

/* ---- What the choice of cosmology changes in a proposal ---- */

export const ProposalInCosmology = z
  .object({
    cosmologyId: z.string(),
    title: z.string(),
    isChosen: z.boolean(),
    /** Against the chosen cosmology, over the targets with a distance. */
    medianDeltaDistanceModulusMag: z.number().nullable(),
    largestDeltaDistanceModulusMag: z.number().nullable(),
    medianScaleRatio: z.number().nullable(),
    /** Sum over the observations that can be done, overheads included. */
    requestedSeconds: z.number(),
    infeasibleCount: z.int(),
    changedObservationCount: z.int(),
  })
  .meta({ id: 'ProposalInCosmology' });
export const ProposalCosmologies = z
  .object({
    targetCount: z.int(),
    observationCount: z.int(),
    /** Targets given by an apparent brightness: cosmology does not change their time, except through a size in kpc. */
    apparentCount: z.int(),
    /** Targets given by a luminosity; the others have no brightness yet. */
    intrinsicCount: z.int(),
    rows: z.array(ProposalInCosmology),
  })
  .meta({ id: 'ProposalCosmologies' });
export type ProposalCosmologies = z.infer<typeof ProposalCosmologies>;

/* ---- Reference data ---- */

export const ReferenceDataFile = z
  .object({
    /** Name under `seed/reference`. */
    file: z.string(),
    title: z.string(),
    source: z.string(),
    licence: z.string(),
    units: z.string(),
    /** `mixed`: each row says for itself. */
    provenance: z.enum(['published', 'publishedFromMemory', 'commonPractice', 'mixed']),
    /** Beginning of the SHA-256 of its content. */
    contentHash: z.string(),
  })
  .meta({ id: 'ReferenceDataFile' });
export const ReferenceDataList = z
  .object({ version: z.string(), rows: z.array(ReferenceDataFile) })
  .meta({ id: 'ReferenceDataList' });
export type ReferenceDataList = z.infer<typeof ReferenceDataList>;
