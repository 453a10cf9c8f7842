import type { DistanceRow, DistancesResponse } from '@faintward/contracts/distances';
import MenuItem from '@mui/material/MenuItem';
import TextField from '@mui/material/TextField';
import Box from '@mui/material/Box';
import { useState } from 'react';
import { colour } from '../../../theme/theme';
import { PlotFrame, type PlotSeries } from '../../../ui/plot/PlotFrame';
import { distanceQuantities, type DistanceQuantity } from '../quantities';

interface CurveChoice {
  id: string;
  title: string;
  label: string;
  unit: string;
  fields: readonly DistanceQuantity['field'][];
  scale: 'linear' | 'log';
}

const choices: readonly CurveChoice[] = [
  {
    id: 'distances',
    title: 'Distances',
    label: 'distance',
    unit: 'Mpc',
    fields: ['luminosityDistanceMpc', 'comovingDistanceMpc', 'angularDiameterDistanceMpc'],
    scale: 'log',
  },
  { id: 'scale', title: 'Scale', label: 'scale', unit: 'kpc/″', fields: ['kpcPerArcsec'], scale: 'linear' },
  {
    id: 'time',
    title: 'Age and lookback',
    label: 'time',
    unit: 'Gyr',
    fields: ['ageGyr', 'lookbackTimeGyr'],
    scale: 'linear',
  },
  {
    id: 'modulus',
    title: 'Distance modulus',
    label: 'modulus',
    unit: 'mag',
    fields: ['distanceModulusMag'],
    scale: 'linear',
  },
  {
    id: 'dimming',
    title: 'Dimming, four conventions',
    label: 'dimming',
    unit: 'mag/″²',
    fields: ['perWavelengthDimmingMag', 'bolometricDimmingMag', 'perFrequencyDimmingMag'],
    scale: 'linear',
  },
  { id: 'expansion', title: 'Expansion rate', label: 'H(z)', unit: 'km/s/Mpc', fields: ['hubbleKmSMpc'], scale: 'log' },
];

const shortNames: Partial<Record<DistanceQuantity['field'], string>> = {
  luminosityDistanceMpc: 'luminosity',
  comovingDistanceMpc: 'comoving',
  angularDiameterDistanceMpc: 'angular diameter',
  ageGyr: 'age',
  lookbackTimeGyr: 'lookback',
  perWavelengthDimmingMag: 'per wavelength',
  bolometricDimmingMag: 'in energy',
  perFrequencyDimmingMag: 'per frequency, and in photons',
};

/** A quantity over redshift, with the asked redshifts marked; the model beside it is dashed. */
export function DistanceCurves({
  curve,
  besideCurve,
  rows,
}: {
  curve: DistancesResponse;
  besideCurve: DistancesResponse | undefined;
  rows: readonly DistanceRow[];
}) {
  const [id, setId] = useState('distances');
  const choice = choices.find((one) => one.id === id) ?? choices[0]!;
  const strokes = [colour.primary, colour.accent, colour.inkSoft];
  const line = (
    source: DistancesResponse,
    field: DistanceQuantity['field'],
    index: number,
    beside: boolean,
  ): PlotSeries => ({
    kind: 'line',
    label: `${shortNames[field] ?? nameOf(field)}${beside ? `, ${source.cosmology.title}` : ''}`,
    values: source.rows.map((row) => ({ x: row.redshift, y: row[field] })),
    colour: strokes[index]!,
    dashed: beside,
    showLabel: !beside && choice.fields.length > 1,
  });
  const series: PlotSeries[] = [
    ...choice.fields.map((field, index) => line(curve, field, index, false)),
    ...(besideCurve && choice.id !== 'dimming'
      ? choice.fields.map((field, index) => line(besideCurve, field, index, true))
      : []),
    ...choice.fields.map<PlotSeries>((field, index) => ({
      kind: 'points',
      label: `${shortNames[field] ?? nameOf(field)} at the redshifts asked`,
      values: rows.slice(0, 200).map((row) => ({ x: row.redshift, y: row[field] })),
      colour: strokes[index]!,
      showLabel: false,
    })),
  ];
  return (
    <Box>
      <TextField
        select
        label="Curve"
        value={choice.id}
        onChange={(event) => setId(event.target.value)}
        sx={{ width: 240, mb: 1.5 }}
      >
        {choices.map((one) => (
          <MenuItem key={one.id} value={one.id}>
            {one.title}
          </MenuItem>
        ))}
      </TextField>
      <PlotFrame
        title={choice.title}
        description={`${choice.title} over redshift in ${curve.cosmology.title}`}
        x={{ label: 'redshift' }}
        y={{ label: choice.label, unit: choice.unit, scale: choice.scale }}
        series={series}
        height={320}
        fileName={`${choice.id}.csv`}
      />
      {besideCurve && choice.id !== 'dimming' && (
        <Box sx={{ fontSize: '0.8125rem', color: 'text.secondary' }}>
          solid: {curve.cosmology.title} · dashed: {besideCurve.cosmology.title} · discs: the redshifts asked
        </Box>
      )}
    </Box>
  );
}

function nameOf(field: DistanceQuantity['field']): string {
  return distanceQuantities.find((quantity) => quantity.field === field)!.label.toLowerCase();
}
