import { BandId } from '@faintward/contracts/light';
import type { Telescope } from '@faintward/contracts/facilities';
import Box from '@mui/material/Box';
import InputAdornment from '@mui/material/InputAdornment';
import ListSubheader from '@mui/material/ListSubheader';
import MenuItem from '@mui/material/MenuItem';
import Stack from '@mui/material/Stack';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import type { ReactNode } from 'react';
import { offeredModes, type Sketch, type SketchField } from '../sketch';

export interface SketchFormProps {
  sketch: Sketch;
  errors: Partial<Record<SketchField, string>>;
  telescopes: readonly Telescope[];
  onChange: (field: SketchField, value: string) => void;
}

/** What goes into an estimate: source, setup, goal, conditions. Draws; the page keeps the state. */
export function SketchForm(props: SketchFormProps) {
  const { sketch } = props;
  const modes = offeredModes(props.telescopes);
  const chosen = modes.find((one) => one.id === sketch.mode);
  const isLine = sketch.light === 'lineFlux' || sketch.light === 'lineLuminosity';
  return (
    <Stack sx={{ gap: 3 }}>
      <Group title="Source">
        <Field {...props} name="redshift" label="Redshift" />
        <Choice
          {...props}
          name="cosmology"
          label="Cosmology"
          options={[
            ['planck18', 'Planck 2018'],
            ['planck15', 'Planck 2015'],
            ['wmap9', 'WMAP nine-year'],
            ['conv70', 'conventional 70 / 0.3'],
            ['ladder73', 'distance ladder, H₀ 73'],
          ]}
        />
        <Choice
          {...props}
          wide
          name="light"
          label="What is known of its light"
          options={[
            ['absoluteMagnitude', 'absolute magnitude'],
            ['apparentMagnitude', 'apparent magnitude'],
            ['lineFlux', 'flux of a line'],
            ['lineLuminosity', 'luminosity of a line'],
          ]}
        />
        {sketch.light === 'apparentMagnitude' && (
          <>
            <Field {...props} name="magnitude" label="Magnitude" unit="mag" />
            <Choice {...props} name="band" label="Band" options={BandId.options.map((band) => [band, band])} />
            <Choice
              {...props}
              name="system"
              label="System"
              options={[
                ['AB', 'AB'],
                ['Vega', 'Vega'],
              ]}
            />
          </>
        )}
        {sketch.light === 'absoluteMagnitude' && (
          <>
            <Field {...props} name="absolute" label="Absolute magnitude" unit="AB" />
            <Field {...props} name="rest" label="At rest wavelength" unit="nm" />
          </>
        )}
        {sketch.light === 'lineFlux' && <Field {...props} name="flux" label="Line flux" unit="erg/s/cm²" />}
        {sketch.light === 'lineLuminosity' && (
          <Field {...props} name="luminosity" label="Line luminosity" unit="erg/s" />
        )}
        {isLine ? (
          <>
            <Field {...props} name="restLine" label="Rest wavelength" unit="nm" />
            <Field {...props} name="width" label="Velocity width" unit="km/s" />
          </>
        ) : (
          <Field {...props} name="slope" label="Slope β" hint="flux per wavelength ∝ λᵝ; −2 is flat in AB" />
        )}
        <Field {...props} name="magnification" label="Lensing magnification" hint="empty: none" />
        <Choice
          {...props}
          name="extent"
          label="Shape"
          options={[
            ['point', 'point'],
            ['sersic', 'galaxy (Sérsic)'],
            ['uniform', 'even surface'],
          ]}
        />
        {sketch.extent === 'sersic' && (
          <>
            <Field {...props} name="radius" label="Half-light radius" />
            <Choice
              {...props}
              name="radiusUnit"
              label="Unit"
              options={[
                ['kpc', 'kpc'],
                ['arcsec', 'arcsec'],
              ]}
            />
            <Field {...props} name="sersic" label="Sérsic index" />
          </>
        )}
      </Group>
      <Group title="Setup">
        <TextField
          select
          label="Instrument and mode"
          value={chosen ? sketch.mode : ''}
          onChange={(event) => props.onChange('mode', event.target.value)}
          error={props.errors.mode !== undefined}
          helperText={
            props.errors.mode ??
            (chosen
              ? `${chosen.telescope.name}, ${chosen.telescope.diameterM} m · configuration ${chosen.mode.configurationVersion}`
              : undefined)
          }
          sx={{ gridColumn: '1 / -1' }}
        >
          {props.telescopes.flatMap((telescope) => [
            <ListSubheader key={telescope.telescopeId}>{telescope.name}</ListSubheader>,
            ...modes
              .filter((one) => one.telescope === telescope)
              .map((one) => (
                <MenuItem key={one.id} value={one.id}>
                  {one.instrument.name} · {one.mode.name}
                </MenuItem>
              )),
          ])}
        </TextField>
      </Group>
      <Group title="Goal">
        <Choice
          {...props}
          wide
          name="goal"
          label="What is asked"
          options={[
            ['signalToNoise', 'time for a signal-to-noise ratio'],
            ['lineSignificance', 'time for a line at n sigma'],
            ['exposureTime', 'signal-to-noise ratio in a time'],
          ]}
        />
        {sketch.goal !== 'exposureTime' && (
          <Field
            {...props}
            name="snr"
            label={sketch.goal === 'lineSignificance' ? 'Significance' : 'S/N'}
            unit={sketch.goal === 'lineSignificance' ? 'σ' : undefined}
          />
        )}
        {sketch.goal !== 'lineSignificance' && (
          <Choice
            {...props}
            name="per"
            label="per"
            options={[
              ['aperture', 'aperture'],
              ['arcsec2', 'square arcsecond'],
              ['pixel', 'pixel'],
              ['resolutionElement', 'resolution element'],
            ]}
          />
        )}
        <Field
          {...props}
          name="single"
          label="One exposure"
          unit="s"
          {...(sketch.goal === 'exposureTime' ? {} : { hint: 'empty: within its bounds' })}
        />
        {sketch.goal === 'exposureTime' && <Field {...props} name="count" label="Exposures" />}
      </Group>
      <Group title="Conditions">
        <Field {...props} name="seeing" label="Seeing" unit="″" hint="zenith, 500 nm" />
        <Field {...props} name="airmass" label="Airmass" />
        <Choice
          {...props}
          name="moon"
          label="Moon class"
          options={[
            ['dark', 'dark'],
            ['grey', 'grey'],
            ['bright', 'bright'],
          ]}
        />
        <Choice
          {...props}
          name="transparency"
          label="Transparency"
          options={[
            ['clear', 'clear'],
            ['thinCloud', 'thin cloud'],
          ]}
        />
      </Group>
    </Stack>
  );
}

function Group({ title, children }: { title: string; children: ReactNode }) {
  return (
    <Box component="fieldset" sx={{ border: 0, p: 0, m: 0, minWidth: 0 }}>
      <Typography component="legend" variant="h4" sx={{ p: 0, mb: 1.75 }}>
        {title}
      </Typography>
      <Box sx={{ display: 'grid', gap: 1.75, gridTemplateColumns: 'repeat(auto-fill, minmax(140px, 1fr))' }}>
        {children}
      </Box>
    </Box>
  );
}

function Field({
  sketch,
  errors,
  onChange,
  name,
  label,
  unit,
  hint,
}: SketchFormProps & { name: SketchField; label: string; unit?: string | undefined; hint?: string }) {
  return (
    <TextField
      label={label}
      value={sketch[name]}
      onChange={(event) => onChange(name, event.target.value)}
      error={errors[name] !== undefined}
      helperText={errors[name] ?? hint}
      slotProps={{
        htmlInput: { inputMode: 'decimal', style: { textAlign: 'right' } },
        input: unit ? { endAdornment: <InputAdornment position="end">{unit}</InputAdornment> } : {},
      }}
    />
  );
}

function Choice({
  sketch,
  errors,
  onChange,
  name,
  label,
  options,
  wide = false,
}: SketchFormProps & {
  name: SketchField;
  label: string;
  options: readonly (readonly [value: string, label: string])[];
  wide?: boolean;
}) {
  return (
    <TextField
      select
      label={label}
      value={sketch[name]}
      onChange={(event) => onChange(name, event.target.value)}
      error={errors[name] !== undefined}
      helperText={errors[name]}
      sx={wide ? { gridColumn: '1 / -1' } : {}}
    >
      {options.map(([value, text]) => (
        <MenuItem key={value} value={value}>
          {text}
        </MenuItem>
      ))}
    </TextField>
  );
}
