import type { Target } from '@faintward/contracts/targets';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Dialog from '@mui/material/Dialog';
import DialogActions from '@mui/material/DialogActions';
import DialogContent from '@mui/material/DialogContent';
import DialogTitle from '@mui/material/DialogTitle';
import Stack from '@mui/material/Stack';
import TextField from '@mui/material/TextField';
import useMediaQuery from '@mui/material/useMediaQuery';
import { useEffect, useId, useRef, useState } from 'react';
import { ApiError } from '../../../lib/api';
import { fonts } from '../../../theme/tokens';
import { useNotices } from '../../../ui/Notices';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { parseNumber } from '../../../ui/form/parseNumber';
import { FieldGroup } from '../../../ui/light/DraftFields';
import { LightFields } from '../../../ui/light/LightFields';
import { RedshiftFields } from '../../../ui/light/RedshiftFields';
import { emptyLightDraft, type LightErrors } from '../../../ui/light/lightDraft';
import { lightFieldOf, readLightDraft } from '../../../ui/light/readLightDraft';
import {
  emptyRedshiftDraft,
  readUncertaintyDraft,
  redshiftFieldOf,
  type RedshiftErrors,
} from '../../../ui/light/redshiftDraft';
import { useCreateTarget } from '../api/targets';

const fields = ['name', 'rightAscension', 'declination', 'notes'] as const;
type Field = (typeof fields)[number];
const needed = ['name', 'rightAscension', 'declination'] as const satisfies readonly Field[];

const empty = {
  cells: { name: '', rightAscension: '', declination: '', notes: '' } satisfies Record<Field, string>,
  redshift: emptyRedshiftDraft,
  light: emptyLightDraft,
};

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
  const [draft, setDraft] = useState(empty);
  const [showLacking, setShowLacking] = useState(false);
  // What a reading brings back has to be there before it is drawn: "Add" waits for the reading and sends it.
  const latest = useRef(empty);
  const reading = useRef(Promise.resolve());
  const attempt = useRef(0);
  const form = useRef<HTMLFormElement>(null);
  const [isWaiting, setIsWaiting] = useState(false);
  const replace = (next: typeof empty) => {
    latest.current = next;
    setDraft(next);
  };
  const change = (part: (old: typeof empty) => Partial<typeof empty>) => {
    create.reset();
    replace({ ...latest.current, ...part(latest.current) });
  };
  // The dialog is longer than a window: what keeps it from being added may be out of sight.
  const [refusedCount, setRefusedCount] = useState(0);
  useEffect(() => {
    if (refusedCount > 0) form.current?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus();
  }, [refusedCount]);
  const close = () => {
    attempt.current += 1;
    onClose();
  };
  const isBusy = create.isPending || isWaiting;

  const { light, uncertainty, lacking, isRedshiftLacking } = readDraft(draft);
  const lightErrors: LightErrors = light.ok ? {} : { ...light.errors };
  const redshiftErrors: RedshiftErrors = uncertainty.ok ? {} : { ...uncertainty.errors };
  const cellErrors: Partial<Record<Field, string>> = {};
  if (showLacking) {
    for (const name of lacking) cellErrors[name] = 'Needed.';
    if (isRedshiftLacking) redshiftErrors.redshift = 'Needed.';
  }
  const error = create.error instanceof ApiError ? create.error : undefined;
  let allPlaced = error !== undefined && error.fieldErrors.length > 0;
  for (const { path, message } of error?.fieldErrors ?? []) {
    const cell = path.replace(/^cells\./, '').replace(/Deg$/, '');
    const own = fields.find((field) => field === cell);
    const redshiftField = redshiftFieldOf(cell, draft.redshift);
    const lightField = lightFieldOf(path, draft.light);
    if (own) cellErrors[own] ??= message;
    else if (redshiftField) redshiftErrors[redshiftField] ??= message;
    else if (lightField) lightErrors[lightField] ??= message;
    else allPlaced = false;
  }

  const submit = async () => {
    if (isBusy) return;
    const own = attempt.current;
    setShowLacking(true);
    setIsWaiting(true);
    await reading.current;
    setIsWaiting(false);
    const typed = latest.current;
    const now = readDraft(typed);
    // Closed while it was read: what was typed stays, and nothing is added behind a person's back.
    if (own !== attempt.current) return;
    if (!now.light.ok || !now.uncertainty.ok || now.lacking.length > 0 || now.isRedshiftLacking) {
      setRefusedCount((count) => count + 1);
      return;
    }
    create.mutate(
      {
        cells: { ...typed.cells, redshift: typed.redshift.redshift },
        redshiftKind: typed.redshift.redshiftKind,
        redshiftUncertainty: now.uncertainty.uncertainty,
        light: now.light.light,
        extent: now.light.extent,
      },
      {
        onSuccess: (target) => {
          announce(`${target.name} added.`);
          replace(empty);
          setShowLacking(false);
          onAdded(target);
        },
      },
    );
  };

  const field = (name: Field, label: string, hint: string, options: { wide?: boolean; figure?: boolean } = {}) => (
    <TextField
      label={label}
      value={draft.cells[name]}
      disabled={create.isPending}
      autoFocus={name === 'name'}
      onChange={(event) => change((old) => ({ cells: { ...old.cells, [name]: event.target.value } }))}
      error={cellErrors[name] !== undefined}
      helperText={cellErrors[name] ?? hint}
      multiline={name === 'notes'}
      sx={options.wide ? { gridColumn: '1 / -1' } : {}}
      slotProps={{ htmlInput: options.figure ? { style: { fontFamily: fonts.mono } } : {} }}
    />
  );
  const redshift = parseNumber(draft.redshift.redshift);
  const sourceProps = { disabled: create.isPending, showLacking };

  return (
    <Dialog
      open={open}
      onClose={() => !create.isPending && close()}
      aria-labelledby={id}
      maxWidth="md"
      fullWidth
      fullScreen={isSmall}
    >
      <Box
        component="form"
        ref={form}
        noValidate
        onSubmit={(event) => {
          event.preventDefault();
          void submit();
        }}
        sx={{ display: 'flex', flexDirection: 'column', minHeight: 0 }}
      >
        <DialogTitle id={id}>Add a target</DialogTitle>
        <DialogContent>
          <Stack sx={{ gap: 3, pt: 1 }}>
            <Box sx={{ display: 'grid', gap: 1.75, gridTemplateColumns: { xs: '1fr', sm: '1fr 1fr 1fr' } }}>
              {field('name', 'Name', '')}
              {field('rightAscension', 'Right ascension', '03 55 04.9, 03h55m04.9s or 58.7704', { figure: true })}
              {field('declination', 'Declination', '−12 41 07, or in degrees', { figure: true })}
              {field('notes', 'Notes', '', { wide: true })}
            </Box>
            <FieldGroup title="Redshift">
              <RedshiftFields
                {...sourceProps}
                draft={draft.redshift}
                errors={redshiftErrors}
                onChange={(part) => change((old) => ({ redshift: { ...old.redshift, ...part } }))}
              />
            </FieldGroup>
            <LightFields
              {...sourceProps}
              draft={draft.light}
              errors={lightErrors}
              redshift={typeof redshift === 'number' && redshift >= 0 && redshift <= 30 ? redshift : undefined}
              proposalId={proposalId}
              onChange={(part) => change((old) => ({ light: { ...old.light, ...part } }))}
              onReading={(next) => {
                reading.current = next;
              }}
            />
            {create.error && !allPlaced && <ProblemDisplay error={create.error} what="Not added" />}
          </Stack>
        </DialogContent>
        <DialogActions sx={{ px: 3, pb: 2 }}>
          <Button onClick={close} disabled={create.isPending} variant="text">
            Close
          </Button>
          <Button type="submit" variant="contained" loading={isBusy}>
            Add the target
          </Button>
        </DialogActions>
      </Box>
    </Dialog>
  );
}

/** What a draft says, part by part. */
function readDraft({ cells, redshift, light }: typeof empty) {
  return {
    light: readLightDraft(light),
    // The redshift goes as it was typed: the server reads every notation of it, as in the table.
    uncertainty: readUncertaintyDraft(redshift),
    lacking: needed.filter((name) => cells[name].trim() === ''),
    isRedshiftLacking: redshift.redshift.trim() === '',
  };
}
