import type { ModeConfiguration } from '@faintward/contracts/facilities';
import Box from '@mui/material/Box';
import { formatDuration, formatNumber } from '../../../lib/format';

type Line = readonly [label: string, value: string];

/** A mode's configuration as lines of label and value with unit. */
function configurationLines(configuration: ModeConfiguration): Line[] {
  const { detector, exposureLimits: limits, overheads, skyAbMagPerArcsec2: sky } = configuration;
  const number = (value: number, significant = 4) =>
    formatNumber(Number(value.toPrecision(significant)), { significant });
  return [
    ['Wavelengths', `${number(configuration.wavelengthLowNm)} to ${number(configuration.wavelengthHighNm)} nm`],
    ...(configuration.kind === 'slitSpectroscopy'
      ? ([
          ['Resolving power', formatNumber(configuration.resolvingPower, { decimals: 0 })],
          ['Slit width', `${formatNumber(configuration.slitWidthArcsec, { decimals: 2 })} ″`],
        ] as Line[])
      : []),
    ['Throughput, telescope to detector', `${formatNumber(100 * configuration.throughput, { decimals: 1 })} %`],
    ['Extinction', `${formatNumber(configuration.extinctionMagPerAirmass, { decimals: 3 })} mag/airmass`],
    [
      'Sky, dark / grey / bright',
      `${[sky.dark, sky.grey, sky.bright].map((value) => formatNumber(value, { decimals: 1 })).join(' / ')} AB mag/″²`,
    ],
    ['Pixel scale', `${formatNumber(detector.pixelScaleArcsec, { decimals: 3 })} ″`],
    ['Read noise', `${formatNumber(detector.readNoiseElectrons, { decimals: 1 })} e⁻`],
    ['Dark current', `${formatNumber(detector.darkElectronsPerSecond, { significant: 2 })} e⁻/s`],
    ['Full well', `${formatNumber(detector.fullWellElectrons, { decimals: 0 })} e⁻`],
    [
      'One exposure',
      `${formatDuration(limits.minimumExposureSeconds)} to ${formatDuration(limits.maximumExposureSeconds)}`,
    ],
    ['Acquisition', formatDuration(overheads.acquisitionSeconds)],
    ['Read-out', formatDuration(overheads.readoutSeconds)],
  ];
}

export function ModeSheet({ configuration }: { configuration: ModeConfiguration }) {
  return (
    <Box
      component="dl"
      sx={{
        display: 'grid',
        gridTemplateColumns: 'repeat(auto-fill, minmax(210px, 1fr))',
        columnGap: 3,
        rowGap: 1,
        m: 0,
        fontSize: '0.875rem',
      }}
    >
      {configurationLines(configuration).map(([label, value]) => (
        <div key={label}>
          <Box component="dt" sx={{ color: 'text.secondary', fontSize: '0.8125rem' }}>
            {label}
          </Box>
          <dd>{value}</dd>
        </div>
      ))}
    </Box>
  );
}
