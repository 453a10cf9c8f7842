import type { Telescope } from '@faintward/contracts/facilities';
import { Observation } from '@faintward/contracts/observations';
import CloseIcon from '@mui/icons-material/Close';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import IconButton from '@mui/material/IconButton';
import Link from '@mui/material/Link';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useState } from 'react';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../../../app/paths';
import { ApiError } from '../../../lib/api';
import { formatDuration } from '../../../lib/format';
import { offeredModes } from '../../../lib/offeredModes';
import { ChangedMeanwhileDialog } from '../../../ui/ChangedMeanwhileDialog';
import { Note } from '../../../ui/Note';
import { useNotices } from '../../../ui/Notices';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { RedshiftValue } from '../../../ui/RedshiftValue';
import { EstimateView } from '../../../ui/estimate/EstimateView';
import { LeaveGuard } from '../../../ui/form/LeaveGuard';
import { useObservationMutations } from '../api/observations';
import { describeConditions, describeGoal, planFieldOf, readPlanDraft, toPlanDraft, type PlanErrors } from '../plan';
import { PlanForm } from './PlanForm';

export interface ObservationPanelProps {
  proposalId: string;
  observation: Observation;
  telescopes: readonly Telescope[];
  canEdit: boolean;
  onClose: () => void;
}

/** One observation: its plan, which can be changed here, and everything that the engine makes of it. */
export function ObservationPanel({ proposalId, observation, telescopes, canEdit, onClose }: ObservationPanelProps) {
  const [isChanging, setIsChanging] = useState(false);
  return (
    <Stack sx={{ gap: 2 }}>
      <Stack direction="row" sx={{ gap: 2, alignItems: 'flex-start' }}>
        <Box sx={{ flex: 1, minWidth: 0 }}>
          <Typography variant="h2" sx={{ overflowWrap: 'anywhere' }}>
            <Link component={RouterLink} to={paths.target.to(proposalId, observation.targetId)} color="inherit">
              {observation.targetName}
            </Link>
          </Typography>
          <Box sx={{ display: 'flex', columnGap: 2, flexWrap: 'wrap', alignItems: 'center', fontSize: '0.875rem' }}>
            <RedshiftValue redshift={observation.redshift} />
            <span>
              {observation.telescopeName} · {observation.instrumentName} · {observation.modeName}, configuration{' '}
              {observation.configurationVersion}
            </span>
          </Box>
        </Box>
        <IconButton onClick={onClose} aria-label="Close the observation" size="small">
          <CloseIcon fontSize="small" />
        </IconButton>
      </Stack>
      {isChanging ? (
        <PlanEditor
          proposalId={proposalId}
          observation={observation}
          telescopes={telescopes}
          onDone={() => setIsChanging(false)}
        />
      ) : (
        <Stack direction="row" sx={{ gap: 2, alignItems: 'center', flexWrap: 'wrap' }}>
          <Typography variant="body2" sx={{ flex: '1 1 220px' }}>
            {describeGoal(observation.goal)}
            <br />
            {describeConditions(observation.conditions)}
            {observation.repeatCount > 1 && (
              <>
                <br />
                {observation.repeatCount} times, together {formatDuration(observation.totalSeconds)}
              </>
            )}
          </Typography>
          {canEdit && (
            <Button size="small" onClick={() => setIsChanging(true)}>
              Change goal and conditions
            </Button>
          )}
        </Stack>
      )}
      {observation.estimate ? (
        <EstimateView estimate={observation.estimate} />
      ) : (
        <Note tone="warning">{observation.lacking ?? 'There is no estimate.'}</Note>
      )}
    </Stack>
  );
}

function PlanEditor({
  proposalId,
  observation,
  telescopes,
  onDone,
}: {
  proposalId: string;
  observation: Observation;
  telescopes: readonly Telescope[];
  onDone: () => void;
}) {
  const { patch } = useObservationMutations(proposalId);
  const announce = useNotices();
  // What was opened: another person's later change makes saving stale instead of being overwritten.
  const [base] = useState(observation);
  const [draft, setDraft] = useState(() => toPlanDraft(observation));
  const read = readPlanDraft(draft);
  const errors: PlanErrors = read.ok ? {} : { ...read.errors };
  const error = patch.error instanceof ApiError ? patch.error : undefined;
  let allPlaced = error !== undefined && error.fieldErrors.length > 0;
  for (const fault of error?.fieldErrors ?? []) {
    const field = planFieldOf(fault.path);
    if (field) errors[field] ??= fault.message;
    else allPlaced = false;
  }
  const current = error?.code === 'stale-version' ? Observation.safeParse(error.current).data : undefined;
  const save = (version: number) => {
    if (!read.ok) return;
    patch.mutate(
      { observationId: observation.observationId, version, patch: read.plan },
      {
        onSuccess: () => {
          announce('Saved.');
          onDone();
        },
      },
    );
  };
  const modeWords = (modeId: string) => {
    const found = offeredModes(telescopes, modeId).find(({ mode }) => mode.modeId === modeId);
    return found ? `${found.instrument.name} · ${found.mode.name}` : 'a mode that is no longer offered';
  };
  return (
    <Box
      component="form"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        save(base.version);
      }}
      sx={{ borderTop: 1, borderBottom: 1, borderColor: 'divider', py: 2 }}
    >
      <LeaveGuard when={JSON.stringify(draft) !== JSON.stringify(toPlanDraft(base))} what="Goal and conditions" />
      <PlanForm
        draft={draft}
        errors={errors}
        telescopes={telescopes}
        keptModeId={base.modeId}
        disabled={patch.isPending}
        onChange={(change) => {
          patch.reset();
          setDraft((old) => ({ ...old, ...change }));
        }}
      />
      {patch.error && !allPlaced && !current && (
        <Box sx={{ mt: 1.5 }}>
          <ProblemDisplay error={patch.error} what="Not saved" />
        </Box>
      )}
      <Stack direction="row" sx={{ gap: 1.25, mt: 2 }}>
        <Button type="submit" variant="contained" loading={patch.isPending} disabled={!read.ok}>
          Save
        </Button>
        <Button variant="text" onClick={onDone} disabled={patch.isPending}>
          Cancel
        </Button>
      </Stack>
      {current && read.ok && (
        <ChangedMeanwhileDialog
          open
          what={`The observation of ${observation.targetName}`}
          rows={[
            { label: 'setup', mine: modeWords(read.plan.modeId), theirs: modeWords(current.modeId) },
            { label: 'goal', mine: describeGoal(read.plan.goal), theirs: describeGoal(current.goal) },
            {
              label: 'conditions',
              mine: describeConditions(read.plan.conditions),
              theirs: describeConditions(current.conditions),
            },
            { label: 'repeats', mine: read.plan.repeatCount, theirs: current.repeatCount },
          ]}
          pending={patch.isPending}
          onMine={() => save(current.version)}
          onTheirs={onDone}
          onLater={() => patch.reset()}
        />
      )}
    </Box>
  );
}
