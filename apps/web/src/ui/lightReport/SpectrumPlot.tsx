import type { BandId } from '@faintward/contracts/light';
import type { BandLight, LightReport, LightSpectrum, ObservedLine } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import { useMemo, useState } from 'react';
import { formatNumber } from '../../lib/format';
import { PlotFigure, type PlotTable } from '../plot/PlotFigure';
import { makeScale } from '../plot/scale';
import { Switch, type SwitchOptions } from '../plot/Switch';
import { useWidth } from '../plot/useWidth';
import { BandSpans } from './BandSpans';
import { bandState } from './darkness';
import { SpectrumDrawing, spectrumMargin } from './SpectrumDrawing';
import { clipCurve, fluxUnit, wavelengthRange, type RangeId } from './spectrum';

export interface SpectrumPlotProps {
  spectrum: LightSpectrum;
  bands: readonly BandLight[];
  lines: readonly ObservedLine[];
  atmosphere: LightReport['atmosphere'];
  /** The band of the ledger. */
  bandId: BandId | null;
  onBandChange: (bandId: BandId) => void;
}

const rangeOptions: SwitchOptions<RangeId> = [
  ['bands', 'Bands'],
  ['optical', 'Optical'],
  ['nearInfrared', 'Near infrared'],
  ['all', 'All'],
];
const quantityOptions = [
  ['flux', 'flux'],
  ['magnitude', 'AB'],
] as const;
const kindOptions = [
  ['log', 'log λ'],
  ['linear', 'linear λ'],
] as const;

/** The light as it arrives above the atmosphere, with bands, lines and what the atmosphere lets through. */
export function SpectrumPlot({ spectrum, bands, lines, atmosphere, bandId, onBandChange }: SpectrumPlotProps) {
  const [box, width] = useWidth(760);
  const [rangeId, setRangeId] = useState<RangeId>('bands');
  const [quantity, setQuantity] = useState<'flux' | 'magnitude'>('flux');
  const [kind, setKind] = useState<'log' | 'linear'>('log');

  const shownRange: RangeId = rangeId === 'band' && bandId === null ? 'bands' : rangeId;
  const range = useMemo(
    () => wavelengthRange(shownRange, spectrum, bands, atmosphere, bandId),
    [shownRange, spectrum, bands, atmosphere, bandId],
  );
  const arriving = useMemo(() => clipCurve(spectrum.wavelengthsNm, spectrum.fluxDensitiesJy, range), [spectrum, range]);
  const unabsorbed = useMemo(
    () => clipCurve(spectrum.wavelengthsNm, spectrum.unabsorbedFluxDensitiesJy, range),
    [spectrum, range],
  );
  const x = useMemo(
    () => makeScale(kind, range, [spectrumMargin.left, width - spectrumMargin.right], 5),
    [kind, range, width],
  );
  const description = `${spectrum.label}, ${micron(range[0])} to ${micron(range[1])} µm observed: ${bandsInWords(bands)}`;

  return (
    <PlotFigure
      title="Spectrum above the atmosphere"
      note={
        <>
          {spectrum.label}. Choose a band to put it into the light budget.
          {(range[0] < spectrum.validLowNm || range[1] > spectrum.validHighNm) &&
            ` Nothing is drawn outside ${micron(spectrum.validLowNm)} to ${micron(spectrum.validHighNm)} µm, where this spectrum says nothing.`}
        </>
      }
      description={description}
      table={tableOf(spectrum)}
      fileName="spectrum.csv"
      box={box}
      actions={
        <>
          <Switch
            label="Wavelengths shown"
            value={shownRange}
            onChange={setRangeId}
            options={bandId ? [...rangeOptions, ['band', `Around ${bandId}`]] : rangeOptions}
          />
          <Switch label="Flux axis" value={quantity} onChange={setQuantity} options={quantityOptions} />
          <Switch label="Wavelength axis" value={kind} onChange={setKind} options={kindOptions} />
        </>
      }
    >
      <Box sx={{ position: 'relative' }}>
        <BandSpans
          bands={bands}
          at={x}
          left={spectrumMargin.left}
          right={width - spectrumMargin.right}
          chosen={bandId}
          onChoose={onBandChange}
        />
        <SpectrumDrawing
          width={width}
          x={x}
          kind={kind}
          range={range}
          quantity={quantity}
          arriving={arriving}
          unabsorbed={unabsorbed}
          band={bands.find((one) => one.bandId === bandId)}
          lines={lines}
          atmosphere={atmosphere}
          description={description}
        />
      </Box>
    </PlotFigure>
  );
}

function micron(nm: number): string {
  return formatNumber(nm / 1000, { significant: 3 });
}

function bandsInWords(bands: readonly BandLight[]): string {
  const dark = bands.filter((band) => bandState(band) === 'dark');
  const unknown = bands.filter((band) => bandState(band) === 'unknown');
  const bright = bands.filter((band) => band.magnitudeAb !== null);
  const brightest = bright.toSorted((a, b) => a.magnitudeAb! - b.magnitudeAb!)[0];
  return [
    brightest
      ? `brightest in ${brightest.label}, ${formatNumber(brightest.magnitudeAb, { decimals: 2 })} AB`
      : 'no magnitude is known in any band',
    dark.length > 0 ? `no light in ${dark.map((band) => band.label).join(', ')}` : '',
    unknown.length > 0 ? `nothing known of ${unknown.map((band) => band.label).join(', ')}` : '',
  ]
    .filter(Boolean)
    .join('; ');
}

function tableOf(spectrum: LightSpectrum): PlotTable {
  const { unit, perJy } = fluxUnit(
    spectrum.unabsorbedFluxDensitiesJy.reduce((largest, value) => Math.max(largest, value), 0),
  );
  return {
    header: ['Wavelength, vacuum (nm)', `Arriving (${unit})`, `Without absorption (${unit})`],
    fileHeader: ['wavelength_vacuum_nm', `arriving_${unit}`, `unabsorbed_${unit}`],
    rows: spectrum.wavelengthsNm.map((wavelength, index) => [
      wavelength,
      (spectrum.fluxDensitiesJy[index] ?? 0) * perJy,
      (spectrum.unabsorbedFluxDensitiesJy[index] ?? 0) * perJy,
    ]),
  };
}
