import type { Target, TargetCells } from '@faintward/contracts/targets';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Dialog from '@mui/material/Dialog';
import DialogActions from '@mui/material/DialogActions';
import DialogContent from '@mui/material/DialogContent';
import DialogTitle from '@mui/material/DialogTitle';
import TextField from '@mui/material/TextField';
import useMediaQuery from '@mui/material/useMediaQuery';
import { useId, useState } from 'react';
import { ApiError } from '../../../lib/api';
import { useNotices } from '../../../ui/Notices';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { fonts } from '../../../theme/tokens';
import { useCreateTarget } from '../api/targets';
import { fieldOfPath, readLightDraft, toLightDraft, type LightErrors } from '../lightDraft';
import { LightFields } from './LightFields';

const fields = ['name', 'rightAscension', 'declination', 'redshift', 'redshiftSigma', 'notes'] as const;
type Field = (typeof fields)[number];
const needed = ['name', 'rightAscension', 'declination', 'redshift'] as const satisfies readonly Field[];
type Cells = Record<Field, string>;

const emptyCells: Cells = { name: '', rightAscension: '', declination: '', redshift: '', redshiftSigma: '', notes: '' };
const noLight = toLightDraft(null, { kind: 'point' });

/** One more target. What is typed stays until it is added, also when the dialog is closed in between. */
export function AddTargetDialog({
  proposalId,
  open,
  onClose,
  onAdded,
}: {
  proposalId: string;
  open: boolean;
  onClose: () => void;
  onAdded: (target: Target) => void;
}) {
  const id = useId();
  const isSmall = useMediaQuery('(max-width: 599.95px)');
  const create = useCreateTarget(proposalId);
  const announce = useNotices();
  const [cells, setCells] = useState(emptyCells);
  const [light, setLight] = useState(noLight);
  const [showErrors, setShowErrors] = useState(false);
  const read = readLightDraft(light);

  const lightErrors: LightErrors = showErrors && !read.ok ? { ...read.errors } : {};
  const cellErrors: Partial<Record<string, string>> = {};
  const lacking = needed.filter((name) => cells[name].trim() === '');
  if (showErrors) for (const name of lacking) cellErrors[name] = 'Needed.';
  const error = create.error instanceof ApiError ? create.error : undefined;
  let allPlaced = error !== undefined && error.fieldErrors.length > 0;
  for (const { path, message } of error?.fieldErrors ?? []) {
    const cell = path.replace(/^cells\./, '').replace(/Deg$/, '');
    const lightField = fieldOfPath(path, light);
    if (fields.some((field) => field === cell)) cellErrors[cell] ??= message;
    else if (lightField) lightErrors[lightField] ??= message;
    else allPlaced = false;
  }

  const submit = () => {
    setShowErrors(true);
    if (!read.ok || lacking.length > 0) return;
    const sent: TargetCells = cells;
    create.mutate(
      { cells: sent, light: read.light, extent: read.extent },
      {
        onSuccess: (target) => {
          announce(`${target.name} added.`);
          setCells(emptyCells);
          setLight(noLight);
          setShowErrors(false);
          onAdded(target);
        },
      },
    );
  };

  const field = (name: Field, label: string, hint: string, options: { wide?: boolean; figure?: boolean } = {}) => (
    <TextField
      label={label}
      value={cells[name]}
      disabled={create.isPending}
      autoFocus={name === 'name'}
      onChange={(event) => {
        create.reset();
        setCells((old) => ({ ...old, [name]: event.target.value }));
      }}
      error={cellErrors[name] !== undefined}
      helperText={cellErrors[name] ?? hint}
      multiline={name === 'notes'}
      sx={options.wide ? { gridColumn: '1 / -1' } : {}}
      slotProps={{ htmlInput: options.figure ? { style: { fontFamily: fonts.mono } } : {} }}
    />
  );

  return (
    <Dialog
      open={open}
      onClose={() => !create.isPending && onClose()}
      aria-labelledby={id}
      maxWidth="md"
      fullWidth
      fullScreen={isSmall}
    >
      <Box
        component="form"
        noValidate
        onSubmit={(event) => {
          event.preventDefault();
          submit();
        }}
        sx={{ display: 'flex', flexDirection: 'column', minHeight: 0 }}
      >
        <DialogTitle id={id}>Add a target</DialogTitle>
        <DialogContent>
          <Box
            sx={{ display: 'grid', gap: 1.75, gridTemplateColumns: { xs: '1fr', sm: '1fr 1fr 1fr' }, pt: 1, mb: 2.5 }}
          >
            {field('name', 'Name', '')}
            {field('rightAscension', 'Right ascension', '03 55 04.9, 03h55m04.9s or 58.7704', { figure: true })}
            {field('declination', 'Declination', '−12 41 07, or in degrees', { figure: true })}
            {field('redshift', 'Redshift', '')}
            {field('redshiftSigma', 'Its uncertainty, 1 σ', 'may be empty')}
            {field('notes', 'Notes', '', { wide: true })}
          </Box>
          <LightFields
            draft={light}
            errors={lightErrors}
            disabled={create.isPending}
            onChange={(name, value) => {
              create.reset();
              setLight((old) => ({ ...old, [name]: value }));
            }}
          />
          {create.error && !allPlaced && (
            <Box sx={{ mt: 2 }}>
              <ProblemDisplay error={create.error} what="Not added" />
            </Box>
          )}
        </DialogContent>
        <DialogActions sx={{ px: 3, pb: 2 }}>
          <Button onClick={onClose} disabled={create.isPending} variant="text">
            Close
          </Button>
          <Button type="submit" variant="contained" loading={create.isPending}>
            Add the target
          </Button>
        </DialogActions>
      </Box>
    </Dialog>
  );
}
