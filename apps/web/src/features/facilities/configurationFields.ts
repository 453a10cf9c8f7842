import { ModeConfigurationInput, NewModeConfiguration, type ModeConfiguration } from '@faintward/contracts/facilities';
import { z } from 'zod';

export interface ConfigurationField {
  /** Where it stands in a {@link ModeConfiguration}. */
  path: string;
  label: string;
  unit?: string;
  hint?: string;
  isText?: boolean;
  isOptional?: boolean;
}

/** Every number of a configuration, in the groups of the form. Sky subtraction is a choice and stands beside them. */
export function configurationGroups(
  kind: ModeConfiguration['kind'],
): { title: string; fields: ConfigurationField[] }[] {
  return [
    {
      title: 'Band and light',
      fields: [
        { path: 'label', label: 'Label', isText: true },
        { path: 'bandId', label: 'Band or disperser', isText: true, hint: 'short, such as J or red' },
        { path: 'wavelengthLowNm', label: 'Shortest wavelength', unit: 'nm', hint: 'vacuum' },
        { path: 'wavelengthHighNm', label: 'Longest wavelength', unit: 'nm', hint: 'vacuum' },
        {
          path: 'throughput',
          label: 'Throughput',
          hint: 'aperture to counted electron, 0 to 1; without atmosphere, slit and aperture',
        },
        { path: 'extinctionMagPerAirmass', label: 'Extinction', unit: 'mag/airmass' },
        {
          path: 'imageQualityFwhmArcsec',
          label: 'Image quality, FWHM',
          unit: '″',
          hint: 'of telescope and instrument; may stay empty',
          isOptional: true,
        },
      ],
    },
    ...(kind === 'slitSpectroscopy'
      ? [
          {
            title: 'Spectrograph',
            fields: [
              { path: 'resolvingPower', label: 'Resolving power', hint: 'λ/Δλ' },
              { path: 'slitWidthArcsec', label: 'Slit width', unit: '″' },
              { path: 'pixelsPerResolutionElement', label: 'Pixels per resolution element', unit: 'px' },
              { path: 'extractionLengthFwhm', label: 'Extraction along the slit', unit: 'FWHM' },
            ],
          },
        ]
      : []),
    {
      title: 'Sky at the zenith',
      fields: [
        { path: 'skyAbMagPerArcsec2.dark', label: 'Dark', unit: 'AB mag/″²' },
        { path: 'skyAbMagPerArcsec2.grey', label: 'Grey', unit: 'AB mag/″²' },
        { path: 'skyAbMagPerArcsec2.bright', label: 'Bright', unit: 'AB mag/″²' },
      ],
    },
    {
      title: 'Detector',
      fields: [
        { path: 'detector.pixelScaleArcsec', label: 'Pixel scale', unit: '″/px' },
        { path: 'detector.readNoiseElectrons', label: 'Read noise', unit: 'e⁻' },
        { path: 'detector.darkElectronsPerSecond', label: 'Dark current', unit: 'e⁻/s' },
        { path: 'detector.fullWellElectrons', label: 'Full well', unit: 'e⁻' },
        { path: 'detector.gainElectronsPerAdu', label: 'Gain', unit: 'e⁻/ADU' },
      ],
    },
    {
      title: 'Exposures',
      fields: [
        { path: 'exposureLimits.minimumExposureSeconds', label: 'Shortest exposure', unit: 's' },
        { path: 'exposureLimits.maximumExposureSeconds', label: 'Longest exposure', unit: 's' },
        {
          path: 'minimumExposureCount',
          label: 'Fewest exposures',
          hint: 'may stay empty: 1, or 5 with dithered frames',
          isOptional: true,
        },
        {
          path: 'systematicErrorFraction',
          label: 'Systematic error',
          hint: 'fraction of the signal that no time removes; may stay empty',
          isOptional: true,
        },
      ],
    },
    {
      title: 'Overheads',
      fields: [
        { path: 'overheads.acquisitionSeconds', label: 'Acquisition', unit: 's' },
        { path: 'overheads.setupSeconds', label: 'Set-up', unit: 's' },
        { path: 'overheads.readoutSeconds', label: 'Read-out, each exposure', unit: 's' },
        { path: 'overheads.ditherSeconds', label: 'Dither, each offset', unit: 's' },
        {
          path: 'overheads.maximumBlockSeconds',
          label: 'Longest block',
          unit: 's',
          hint: 'then the target is acquired again',
        },
      ],
    },
  ];
}

export const skySubtractionWords = {
  '': 'not stated',
  wideArea: 'from a wide area around the source',
  annulus: 'from an annulus',
  ditheredFrames: 'from dithered frames',
} as const;

export interface Difference {
  label: string;
  before: string;
  after: string;
}

/** What one configuration has other than another, in words and units. */
export function differencesOf(before: ModeConfiguration, after: ModeConfiguration): Difference[] {
  const fields: ConfigurationField[] = [
    ...configurationGroups(after.kind).flatMap((group) => group.fields),
    { path: 'skySubtraction.kind', label: 'Sky subtraction', isText: true },
    { path: 'skySubtraction.backgroundPixelRatio', label: 'Pixels of the annulus, per pixel of the aperture' },
  ];
  return fields.flatMap((field) => {
    const [old, now] = [valueAt(before, field.path), valueAt(after, field.path)];
    return Object.is(old, now)
      ? []
      : [{ label: groupedLabel(field, after.kind), before: inWords(old, field), after: inWords(now, field) }];
  });
}

/** "Dark" alone says little outside its group. */
function groupedLabel(field: ConfigurationField, kind: ModeConfiguration['kind']): string {
  if (!field.path.startsWith('skyAbMag')) return field.label;
  const group = configurationGroups(kind).find(({ fields }) => fields.some(({ path }) => path === field.path));
  return group ? `${group.title}, ${field.label.toLowerCase()}` : field.label;
}

export function valueAt(value: unknown, path: string): unknown {
  return path
    .split('.')
    .reduce<unknown>(
      (inner, key) =>
        typeof inner === 'object' && inner !== null ? (inner as Record<string, unknown>)[key] : undefined,
      value,
    );
}

function inWords(value: unknown, field: ConfigurationField): string {
  if (value === undefined || value === null || value === '') return 'not stated';
  if (typeof value === 'number') {
    // All digits as stored: what is compared must not be rounded.
    return `${String(value).replace(/^-/, '−')}${field.unit ? ` ${field.unit}` : ''}`;
  }
  return field.path === 'skySubtraction.kind'
    ? skySubtractionWords[value as keyof typeof skySubtractionWords]
    : String(value);
}

/** What the form holds: fields left empty are null, a sky subtraction that is not stated has the kind ''. */
export type ConfigurationFormValues = Record<string, unknown>;

export function toForm(configuration: ModeConfiguration): ConfigurationFormValues {
  return {
    configuration: { ...configuration, skySubtraction: configuration.skySubtraction ?? { kind: '' } },
    note: '',
  };
}

/** The contract's schema; fields that may stay empty are left out when they are, and a note is asked for. */
export const ConfigurationForm: z.ZodType<NewModeConfiguration, ConfigurationFormValues> = z.preprocess(
  withoutEmptyOptions,
  NewModeConfiguration.extend({
    configuration: ModeConfigurationInput,
    note: NewModeConfiguration.shape.note.refine((note) => note.trim() !== '', {
      error: 'Say what changed and why: estimates refer to this version for years.',
    }),
  }),
) as unknown as z.ZodType<NewModeConfiguration, ConfigurationFormValues>;

function withoutEmptyOptions(values: unknown): unknown {
  const { configuration, ...rest } = values as { configuration: Record<string, unknown> };
  const kept = Object.entries(configuration).filter(([key, value]) => {
    if (key === 'skySubtraction') return (value as { kind?: unknown } | null)?.kind !== '';
    return value !== null;
  });
  return { ...rest, configuration: Object.fromEntries(kept) };
}
