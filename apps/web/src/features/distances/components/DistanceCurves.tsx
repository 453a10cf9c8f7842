import { CosmologyPresetId, type CosmologyPreset } from '@faintward/contracts/cosmology';
import type { DistanceRow, DistancesResponse } from '@faintward/contracts/distances';
import Box from '@mui/material/Box';
import FormControlLabel from '@mui/material/FormControlLabel';
import InputAdornment from '@mui/material/InputAdornment';
import ListSubheader from '@mui/material/ListSubheader';
import MenuItem from '@mui/material/MenuItem';
import Switch from '@mui/material/Switch';
import TextField from '@mui/material/TextField';
import { colour } from '../../../theme/theme';
import { parseNumber } from '../../../ui/form/parseNumber';
import { PlotFrame, type PlotSeries } from '../../../ui/plot/PlotFrame';
import type { CalculatorState } from '../calculatorState';
import { againstFirst, curveChoices, curveOf, curvesOf, type Curve, type CurveChoice } from '../curves';

type CurveState = Pick<CalculatorState, 'curve' | 'sizeKpc' | 'beside' | 'against'>;

/** Told apart by colour and by stroke; the first of each list is the chosen cosmology's or line's. */
const colours = [colour.primary, colour.accent, colour.inkSoft, colour.warn, colour.good, colour.bad];
const strokes = [undefined, '7 4', '2 3', '9 3 2 3', '4 4', '1 4'];

/** A quantity over redshift in one or several cosmologies, as it is or against the first; the asked redshifts are marked. */
export function DistanceCurves({
  models,
  rows,
  presets,
  state,
  chosenId,
  onChange,
}: {
  /** The chosen cosmology first. */
  models: readonly DistancesResponse[];
  rows: readonly DistanceRow[];
  presets: readonly CosmologyPreset[];
  state: CurveState;
  chosenId: string;
  onChange: (change: Partial<CurveState>) => void;
}) {
  const choice = curveOf(state.curve);
  const typedSize = parseNumber(state.sizeKpc);
  const sizeKpc = typeof typedSize === 'number' && typedSize > 0 ? typedSize : null;
  const isAngle = choice.id === 'angle';
  const isAgainst = state.against && models.length > 1;
  const first = models[0];
  return (
    <Box>
      <Box
        sx={{
          display: 'grid',
          gap: 1.5,
          mb: 2,
          gridTemplateColumns: 'repeat(auto-fit, minmax(190px, 1fr))',
          alignItems: 'start',
        }}
      >
        <TextField select label="Curve" value={choice.id} onChange={(event) => onChange({ curve: event.target.value })}>
          {[...new Set(curveChoices.map((one) => one.group))].flatMap((group) => [
            <ListSubheader key={group}>{group}</ListSubheader>,
            ...curveChoices
              .filter((one) => one.group === group)
              .map((one) => (
                <MenuItem key={one.id} value={one.id}>
                  {one.title}
                </MenuItem>
              )),
          ])}
        </TextField>
        {isAngle && (
          <TextField
            label="Length at the source"
            value={state.sizeKpc}
            onChange={(event) => onChange({ sizeKpc: event.target.value })}
            error={sizeKpc === null}
            helperText={sizeKpc === null ? 'A length above 0.' : 'proper, not comoving'}
            slotProps={{
              htmlInput: { inputMode: 'decimal', style: { textAlign: 'right' } },
              input: { endAdornment: <InputAdornment position="end">kpc</InputAdornment> },
            }}
          />
        )}
        <TextField
          select
          label="Cosmologies beside"
          value={state.beside}
          onChange={(event) => onChange({ beside: readPresets(event.target.value) })}
          slotProps={{
            select: {
              multiple: true,
              displayEmpty: true,
              renderValue: (value) => presetsText(readPresets(value), presets),
            },
            inputLabel: { shrink: true },
          }}
        >
          {CosmologyPresetId.options.map((id) => (
            <MenuItem key={id} value={id} disabled={id === chosenId}>
              {titleOf(id, presets)}
              {id === chosenId && ' (chosen)'}
            </MenuItem>
          ))}
        </TextField>
      </Box>
      <FormControlLabel
        control={<Switch checked={state.against} onChange={(_event, against) => onChange({ against })} />}
        label={`As ${choice.compares === 'ratio' ? 'ratios' : 'differences'} to the chosen cosmology`}
        disabled={models.length < 2}
        sx={{ mb: 1 }}
      />
      {first && (
        <PlotFrame
          title={isAgainst ? `${choice.title}, against ${first.cosmology.title}` : choice.title}
          description={`${choice.title} over redshift in ${models.map((model) => model.cosmology.title).join(', ')}${
            isAgainst ? `, against ${first.cosmology.title}` : ''
          }`}
          x={{ label: 'redshift' }}
          y={
            isAgainst
              ? { label: choice.compares, ...(choice.compares === 'difference' ? { unit: 'mag' } : {}) }
              : { label: choice.label, unit: choice.unit, scale: choice.scale }
          }
          series={
            isAgainst
              ? lines(againstFirst(choice, models, sizeKpc ?? 1), choice, 1)
              : [...lines(curvesOf(choice, models, sizeKpc ?? 1), choice, 0), ...asked(choice, rows, sizeKpc ?? 1)]
          }
          height={340}
          fileName={`${choice.id}${isAgainst ? `-${choice.compares}` : ''}.csv`}
        />
      )}
      <Box sx={{ fontSize: '0.8125rem', color: 'text.secondary' }}>
        {choice.group === 'Dimming of surface brightness' || choice.id === 'dimming'
          ? 'Dimming depends on the redshift alone: it is the same in every cosmology.'
          : isAgainst
            ? ''
            : 'Discs: the redshifts asked.'}
      </Box>
    </Box>
  );
}

/** `firstIndex`: which place in the lists of colours the first cosmology takes. */
function lines(curves: readonly Curve[], choice: CurveChoice, firstIndex: number): PlotSeries[] {
  const models = [...new Set(curves.map((curve) => curve.cosmologyId))];
  const isAlone = choice.lines.length === 1;
  return curves.map((curve) => {
    const model = models.indexOf(curve.cosmologyId) + firstIndex;
    const line = choice.lines.findIndex((one) => one.name === curve.line);
    const dash = strokes[model % strokes.length];
    return {
      kind: 'line',
      label: isAlone ? curve.title : models.length > 1 ? `${curve.line}, ${curve.title}` : curve.line,
      values: curve.values,
      colour: colours[(isAlone ? model : line) % colours.length]!,
      ...(dash ? { dashed: dash } : {}),
      // With several lines and cosmologies the chosen one is named in the picture; strokes tell the others apart.
      showLabel: isAlone || model === firstIndex,
    };
  });
}

function asked(choice: CurveChoice, rows: readonly DistanceRow[], sizeKpc: number): PlotSeries[] {
  return choice.lines.map((line, index) => ({
    kind: 'points',
    label: `${line.name} at the redshifts asked`,
    values: rows.slice(0, 200).map((row) => ({ x: row.redshift, y: line.value(row, sizeKpc) })),
    colour: colours[index]!,
    showLabel: false,
  }));
}

function readPresets(value: unknown): CosmologyPresetId[] {
  return CosmologyPresetId.options.filter((id) => Array.isArray(value) && value.includes(id));
}

function titleOf(id: CosmologyPresetId, presets: readonly CosmologyPreset[]): string {
  return presets.find((preset) => preset.id === id)?.title ?? id;
}

function presetsText(ids: readonly CosmologyPresetId[], presets: readonly CosmologyPreset[]): string {
  return ids.length === 0 ? 'none' : ids.map((id) => titleOf(id, presets)).join(', ');
}
