import { Target, type TargetPatch } from '@faintward/contracts/targets';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import { useState } from 'react';
import { ApiError } from '../../../lib/api';
import { ChangedMeanwhileDialog } from '../../../ui/ChangedMeanwhileDialog';
import { useNotices } from '../../../ui/Notices';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { LeaveGuard } from '../../../ui/form/LeaveGuard';
import { usePatchTarget } from '../api/targets';
import { describeExtent } from '../cells';
import { fieldOfPath, readLightDraft, toLightDraft, type LightErrors } from '../lightDraft';
import { LightFields } from './LightFields';

/** Light and size of one target, saved as a whole. */
export function LightForm({ proposalId, target }: { proposalId: string; target: Target }) {
  const patch = usePatchTarget(proposalId);
  const announce = useNotices();
  const [base, setBase] = useState(target);
  const [draft, setDraft] = useState(() => toLightDraft(target.light, target.extent));
  const [showErrors, setShowErrors] = useState(false);
  const stored = toLightDraft(base.light, base.extent);
  const isDirty = JSON.stringify(stored) !== JSON.stringify(draft);
  if (target.version !== base.version && !isDirty) {
    // Changed elsewhere while nothing is typed here: follow.
    setBase(target);
    setDraft(toLightDraft(target.light, target.extent));
  }
  const read = readLightDraft(draft);
  const errors: LightErrors = showErrors && !read.ok ? { ...read.errors } : {};
  const error = patch.error instanceof ApiError ? patch.error : undefined;
  let allPlaced = error !== undefined && error.fieldErrors.length > 0;
  for (const fault of error?.fieldErrors ?? []) {
    const field = fieldOfPath(fault.path, draft);
    if (field) errors[field] ??= fault.message;
    else allPlaced = false;
  }
  const current = error?.code === 'stale-version' ? Target.safeParse(error.current).data : undefined;

  const save = (version: number) => {
    setShowErrors(true);
    if (!read.ok) return;
    const change: TargetPatch = { light: read.light, extent: read.extent };
    patch.mutate(
      { targetId: target.targetId, version, patch: change },
      {
        onSuccess: (saved) => {
          setBase(saved);
          setDraft(toLightDraft(saved.light, saved.extent));
          setShowErrors(false);
          announce('Saved.');
        },
      },
    );
  };

  return (
    <form
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        save(base.version);
      }}
    >
      <LeaveGuard when={isDirty} what="Light and size" />
      <LightFields
        draft={draft}
        errors={errors}
        disabled={patch.isPending}
        onChange={(field, value) => {
          patch.reset();
          setDraft((old) => ({ ...old, [field]: value }));
        }}
      />
      {patch.error && !allPlaced && !current && (
        <Box sx={{ mt: 1.5 }}>
          <ProblemDisplay error={patch.error} what="Not saved" />
        </Box>
      )}
      <Stack direction="row" sx={{ gap: 1.25, mt: 2 }}>
        <Button type="submit" variant="contained" loading={patch.isPending} disabled={!isDirty}>
          Save light and size
        </Button>
        {isDirty && (
          <Button
            variant="text"
            disabled={patch.isPending}
            onClick={() => {
              patch.reset();
              setBase(target);
              setDraft(toLightDraft(target.light, target.extent));
              setShowErrors(false);
            }}
          >
            Put back
          </Button>
        )}
      </Stack>
      {current && read.ok && (
        <ChangedMeanwhileDialog
          open
          what={target.name}
          rows={[
            {
              label: 'light',
              mine: read.light === null ? 'nothing yet' : describeDraftLight(draft),
              theirs: current.brightnessText || 'nothing yet',
            },
            { label: 'size', mine: describeExtent(read.extent), theirs: describeExtent(current.extent) },
          ]}
          onMine={() => save(current.version)}
          onTheirs={() => {
            patch.reset();
            setBase(current);
            setDraft(toLightDraft(current.light, current.extent));
          }}
          onLater={() => patch.reset()}
          pending={patch.isPending}
        />
      )}
    </form>
  );
}

function describeDraftLight(draft: ReturnType<typeof toLightDraft>): string {
  switch (draft.light) {
    case 'none':
      return 'nothing yet';
    case 'apparentMagnitude':
      return `${draft.magnitude} ${draft.system} (${draft.band})`;
    case 'absoluteMagnitude':
      return `M ${draft.absolute} (${draft.restContinuum} nm)`;
    case 'lineFlux':
      return `${draft.flux} erg/s/cm² (${draft.restLine} nm)`;
    case 'lineLuminosity':
      return `${draft.luminosity} erg/s (${draft.restLine} nm)`;
  }
}
