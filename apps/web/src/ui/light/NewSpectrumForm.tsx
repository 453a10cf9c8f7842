import { NewSpectrum } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import { useState } from 'react';
import { ApiError } from '../../lib/api';
import { parseNumber } from '../form/parseNumber';
import { useNotices } from '../Notices';
import { ProblemDisplay } from '../ProblemDisplay';
import { DraftChoice, DraftField, DraftTick, FieldGrid, FieldGroup } from './DraftFields';
import { DraftText, TableTextField } from './TableTextField';
import { useSpectrumMutations } from './lightQueries';

interface Draft {
  name: string;
  source: string;
  text: string;
  wavelengthUnit: 'guess' | 'nm' | 'angstrom' | 'micron';
  fluxKind: 'perWavelength' | 'perFrequency';
  isAirWavelength: boolean;
  observedAtRedshift: string;
}
const empty: Draft = {
  name: '',
  source: '',
  text: '',
  wavelengthUnit: 'guess',
  fluxKind: 'perWavelength',
  isAirWavelength: false,
  observedAtRedshift: '0',
};
type Errors = Partial<Record<keyof Draft, string>>;

function read(draft: Draft): { input: NewSpectrum } | { errors: Errors } {
  const parsed = NewSpectrum.safeParse({
    ...draft,
    wavelengthUnit: draft.wavelengthUnit === 'guess' ? null : draft.wavelengthUnit,
    observedAtRedshift: parseNumber(draft.observedAtRedshift) ?? undefined,
  });
  const errors: Errors = {};
  for (const issue of parsed.error?.issues ?? []) errors[issue.path[0] as keyof Draft] ??= issue.message;
  if (draft.text.trim() === '') errors.text = 'Paste a table, or choose a file.';
  return parsed.success && Object.keys(errors).length === 0 ? { input: parsed.data } : { errors };
}

/** One more spectrum: a file or pasted columns, and what they are. What is typed stays until it is stored. */
export function NewSpectrumForm({ proposalId }: { proposalId: string }) {
  const { add } = useSpectrumMutations(proposalId);
  const announce = useNotices();
  const [draft, setDraft] = useState(empty);
  const [showLacking, setShowLacking] = useState(false);
  const result = read(draft);
  const errors: Errors = showLacking && 'errors' in result ? { ...result.errors } : {};
  const fieldErrors = add.error instanceof ApiError ? add.error.fieldErrors : [];
  for (const { path, message } of fieldErrors) if (path in draft) errors[path as keyof Draft] ??= message;
  const isPlaced = fieldErrors.length > 0 && fieldErrors.every(({ path }) => path in draft);
  const change = (part: Partial<Draft>) => {
    add.reset();
    setDraft((old) => ({ ...old, ...part }));
  };
  const props = { draft, errors, showLacking, disabled: add.isPending, onChange: change };
  const submit = () => {
    setShowLacking(true);
    if (!('input' in result)) return;
    add.mutate(result.input, {
      onSuccess: (stored) => {
        announce(`${stored.name} added.`);
        setDraft(empty);
        setShowLacking(false);
      },
    });
  };
  return (
    <FieldGroup
      title="Add a spectrum"
      note="Two columns, wavelength and flux density, with any separator and with or without a header. The scale of the flux does not matter: a target’s light says how bright it is."
    >
      <Stack sx={{ gap: 1.75 }}>
        <TableTextField
          label="Table"
          value={draft.text}
          error={errors.text}
          disabled={add.isPending}
          placeholder={'1200.0  1.31\n1201.0  1.29'}
          onChange={(text, fileName) =>
            change({
              text,
              ...(fileName && draft.name === '' ? { name: fileName.replace(/\.[^.]+$/, '').slice(0, 80) } : {}),
            })
          }
        />
        <FieldGrid columns={190}>
          <DraftText {...props} name="name" label="Name" />
          <DraftText {...props} name="source" label="Where it is from" hint="paper or instrument; may be empty" />
          <DraftField
            {...props}
            name="observedAtRedshift"
            label="Observed at redshift"
            hint="0: it is in the rest frame"
          />
          <DraftChoice
            {...props}
            name="wavelengthUnit"
            label="Wavelengths in"
            options={[
              ['guess', 'what the header says'],
              ['nm', 'nm'],
              ['angstrom', 'Å'],
              ['micron', 'µm'],
            ]}
          />
          <DraftChoice
            {...props}
            name="fluxKind"
            label="Flux density per unit"
            options={[
              ['perWavelength', 'wavelength, f_λ'],
              ['perFrequency', 'frequency, f_ν'],
            ]}
          />
        </FieldGrid>
        <DraftTick
          label="Wavelengths in air"
          checked={draft.isAirWavelength}
          consequence={
            draft.isAirWavelength ? 'They are turned into vacuum wavelengths.' : 'They are taken as vacuum wavelengths.'
          }
          disabled={add.isPending}
          onChange={(isAirWavelength) => change({ isAirWavelength })}
        />
        {add.error && !isPlaced && <ProblemDisplay error={add.error} what="Not added; the table is still here" />}
        <Box>
          <Button variant="contained" loading={add.isPending} onClick={submit}>
            Add the spectrum
          </Button>
        </Box>
      </Stack>
    </FieldGroup>
  );
}
