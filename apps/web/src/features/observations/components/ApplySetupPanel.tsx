import type { CosmologyChoice } from '@faintward/contracts/cosmology';
import type { EstimateRequest } from '@faintward/contracts/estimates';
import type { Telescope } from '@faintward/contracts/facilities';
import type { ApplySetupResult, Observation } from '@faintward/contracts/observations';
import type { Target } from '@faintward/contracts/targets';
import Autocomplete from '@mui/material/Autocomplete';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Checkbox from '@mui/material/Checkbox';
import FormControlLabel from '@mui/material/FormControlLabel';
import Radio from '@mui/material/Radio';
import RadioGroup from '@mui/material/RadioGroup';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import { useQuery } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { ApiError } from '../../../lib/api';
import { counted, formatDuration, formatNumber } from '../../../lib/format';
import { offeredModes } from '../../../lib/offeredModes';
import { useDebounced } from '../../../lib/useDebounced';
import { Note } from '../../../ui/Note';
import { Panel } from '../../../ui/Panel';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { observationQueries, useObservationMutations } from '../api/observations';
import { firstPlan, planFieldOf, readPlanDraft, toPlanDraft, type PlanDraft, type PlanErrors } from '../plan';
import { EstimateSummary } from './EstimateSummary';
import { PlanForm } from './PlanForm';

/** What this panel needs to know of a target. */
export type TargetOption = Pick<Target, 'targetId' | 'name' | 'redshift' | 'light' | 'extent' | 'brightnessText'>;

export interface ApplySetupPanelProps {
  proposalId: string;
  cosmology: CosmologyChoice;
  telescopes: readonly Telescope[];
  /** Those that match what is searched for; the first of them without a search. */
  targets: readonly TargetOption[];
  targetCount: number;
  /** An observation of the proposal, to start from its plan; without one from the first mode that is offered. */
  like: Observation | undefined;
  onSearchTargets: (search: string) => void;
  isSearching: boolean;
  onApplied: () => void;
}

/** One setup, goal and conditions for many targets at once, answered for an example while it is typed. */
export function ApplySetupPanel({
  proposalId,
  cosmology,
  telescopes,
  targets,
  targetCount,
  like,
  onSearchTargets,
  isSearching,
  onApplied,
}: ApplySetupPanelProps) {
  const { apply } = useObservationMutations(proposalId);
  const [draft, setDraft] = useState<PlanDraft>(() => {
    const modes = offeredModes(telescopes);
    if (like && modes.some(({ mode }) => mode.modeId === like.modeId)) return toPlanDraft(like);
    const [first] = modes;
    return first
      ? { ...firstPlan, mode: first.mode.modeId, seeing: String(first.telescope.site.zenithSeeingArcsec) }
      : firstPlan;
  });
  const [scope, setScope] = useState<'all' | 'chosen'>('all');
  const [chosen, setChosen] = useState<readonly TargetOption[]>([]);
  const [example, setExample] = useState<TargetOption | null>(null);
  const [replaceSameMode, setReplaceSameMode] = useState(true);
  const [result, setResult] = useState<ApplySetupResult>();

  const candidates = scope === 'chosen' ? chosen : targets;
  const shownExample = example ?? candidates.find((target) => target.light !== null) ?? null;
  const settled = useDebounced(draft, 300);
  const read = useMemo(() => readPlanDraft(settled), [settled]);
  const request: EstimateRequest | undefined =
    read.ok && shownExample?.light
      ? {
          cosmology,
          target: { redshift: shownExample.redshift, light: shownExample.light, extent: shownExample.extent },
          setup: { modeId: read.plan.modeId },
          goal: read.plan.goal,
          conditions: read.plan.conditions,
        }
      : undefined;
  const estimate = useQuery(observationQueries.estimate(request));

  const errors: PlanErrors = read.ok ? {} : { ...read.errors };
  const unplaced: string[] = [];
  for (const error of [apply.error, request ? estimate.error : null]) {
    if (!(error instanceof ApiError)) continue;
    for (const fault of error.fieldErrors) {
      const field = planFieldOf(fault.path);
      if (field) errors[field] ??= fault.message;
      else if (!unplaced.includes(fault.message)) unplaced.push(fault.message);
    }
  }
  const isIncomplete = scope === 'chosen' && chosen.length === 0;

  const submit = () => {
    const now = readPlanDraft(draft);
    if (!now.ok) return;
    apply.mutate(
      {
        ...now.plan,
        targetIds: scope === 'all' ? 'all' : chosen.map((target) => target.targetId),
        replaceSameMode,
      },
      {
        onSuccess: (answer) => {
          setResult(answer);
          onApplied();
        },
      },
    );
  };

  return (
    <Panel title="Apply a setup" note="The same instrument mode, goal and conditions for many targets at once.">
      <Box
        sx={{
          display: 'grid',
          gap: { xs: 3, md: 4 },
          gridTemplateColumns: { xs: 'minmax(0, 1fr)', md: 'minmax(0, 7fr) minmax(0, 5fr)' },
          alignItems: 'start',
        }}
      >
        <Box
          component="form"
          noValidate
          onSubmit={(event) => {
            event.preventDefault();
            submit();
          }}
        >
          <PlanForm
            draft={draft}
            errors={errors}
            telescopes={telescopes}
            disabled={apply.isPending}
            onChange={(change) => {
              apply.reset();
              setResult(undefined);
              setDraft((old) => ({ ...old, ...change }));
            }}
          />
          <Box component="fieldset" sx={{ border: 0, p: 0, m: 0, mt: 2.5, minWidth: 0 }}>
            <Typography component="legend" variant="h4" sx={{ p: 0, mb: 0.5 }}>
              For
            </Typography>
            <RadioGroup
              row
              aria-label="For which targets"
              value={scope}
              onChange={(_event, value) => {
                setScope(value === 'chosen' ? 'chosen' : 'all');
                setExample(null);
                setResult(undefined);
              }}
            >
              <FormControlLabel
                value="all"
                control={<Radio size="small" />}
                label={targetCount === 1 ? 'the one target' : `all ${counted(targetCount, 'target')}`}
              />
              <FormControlLabel value="chosen" control={<Radio size="small" />} label="chosen targets" />
            </RadioGroup>
            {scope === 'chosen' && (
              <TargetPicker
                label="Targets"
                targets={targets}
                value={chosen}
                onSearch={onSearchTargets}
                isSearching={isSearching}
                onChange={(next) => {
                  setChosen(next);
                  setExample(null);
                }}
              />
            )}
            <FormControlLabel
              label="Replace what these targets have in the same mode already"
              control={
                <Checkbox
                  size="small"
                  checked={replaceSameMode}
                  onChange={(_event, checked) => setReplaceSameMode(checked)}
                />
              }
            />
          </Box>
          {unplaced.map((message) => (
            <Box key={message} sx={{ mt: 1 }}>
              <Note tone="error">{message}</Note>
            </Box>
          ))}
          {apply.error && !(apply.error instanceof ApiError && apply.error.fieldErrors.length > 0) && (
            <Box sx={{ mt: 1 }}>
              <ProblemDisplay error={apply.error} what="Not applied" onRetry={submit} />
            </Box>
          )}
          <Button
            type="submit"
            variant="contained"
            loading={apply.isPending}
            disabled={!read.ok || isIncomplete || targetCount === 0}
            sx={{ mt: 1.5 }}
          >
            {scope === 'all'
              ? `Apply to ${counted(targetCount, 'target')}`
              : `Apply to ${counted(chosen.length, 'target')}`}
          </Button>
          <Box role="status" sx={{ mt: result ? 1.5 : 0 }}>
            {result && (
              <Note tone={result.infeasibleCount + result.lackingCount > 0 ? 'warning' : 'good'}>
                {describeResult(result)}
              </Note>
            )}
          </Box>
        </Box>
        <Box sx={{ minWidth: 0, position: { md: 'sticky' }, top: 16 }}>
          <Typography variant="h4" sx={{ mb: 1.25 }}>
            What it gives for one of them
          </Typography>
          <Autocomplete
            options={[...candidates]}
            value={shownExample}
            onChange={(_event, target) => setExample(target)}
            {...(scope === 'all'
              ? {
                  filterOptions: (options: TargetOption[]) => options,
                  onInputChange: (_event: unknown, search: string, reason: string) => {
                    if (reason === 'input') onSearchTargets(search);
                  },
                  loading: isSearching,
                }
              : {})}
            getOptionLabel={(target) => target.name}
            getOptionKey={(target) => target.targetId}
            isOptionEqualToValue={(one, other) => one.targetId === other.targetId}
            getOptionDisabled={(target) => target.light === null}
            renderInput={(inputProps) => (
              <TextField
                {...inputProps}
                label="Example"
                helperText={
                  shownExample
                    ? `z ${shownExample.redshift} · ${shownExample.brightnessText || 'no brightness'}`
                    : 'None of these targets has a brightness yet.'
                }
              />
            )}
          />
          <Box sx={{ mt: 2, opacity: settled === draft && !estimate.isFetching ? 1 : 0.65 }}>
            {!read.ok && (
              <Note tone="warning">
                The plan is not complete{estimate.data ? ': this is the answer to what stood there before' : ''}.
              </Note>
            )}
            {request &&
              estimate.error &&
              !(estimate.error instanceof ApiError && estimate.error.fieldErrors.length > 0) && (
                <ProblemDisplay error={estimate.error} what="No estimate" onRetry={() => void estimate.refetch()} />
              )}
            {estimate.data && !estimate.error && shownExample && <EstimateSummary estimate={estimate.data} />}
          </Box>
          <Typography variant="body2" color="textSecondary" sx={{ mt: 2 }}>
            Exposure times are planning figures, to be confirmed by the observatory’s instrument team.
          </Typography>
        </Box>
      </Box>
    </Panel>
  );
}

/** Several of perhaps thousands, found by name on the server. */
function TargetPicker({
  label,
  targets,
  value,
  onSearch,
  isSearching,
  onChange,
}: {
  label: string;
  targets: readonly TargetOption[];
  value: readonly TargetOption[];
  onSearch: (search: string) => void;
  isSearching: boolean;
  onChange: (value: readonly TargetOption[]) => void;
}) {
  return (
    <Autocomplete
      multiple
      disableCloseOnSelect
      options={[...targets]}
      value={[...value]}
      loading={isSearching}
      filterOptions={(options) => options}
      onInputChange={(_event, search, reason) => {
        if (reason !== 'reset') onSearch(search);
      }}
      onChange={(_event, next) => onChange(next)}
      getOptionLabel={(target) => target.name}
      getOptionKey={(target) => target.targetId}
      isOptionEqualToValue={(one, other) => one.targetId === other.targetId}
      limitTags={6}
      renderInput={(inputProps) => <TextField {...inputProps} label={label} helperText="Type a part of a name." />}
      sx={{ my: 1 }}
    />
  );
}

function describeResult(result: ApplySetupResult): string {
  const whole = (count: number) => formatNumber(count, { decimals: 0 });
  const parts = [
    `${counted(result.createdCount, 'observation')} planned`,
    `${whole(result.feasibleCount)} feasible, together ${formatDuration(result.totalSeconds)}`,
    result.infeasibleCount > 0 && `${whole(result.infeasibleCount)} not feasible`,
    result.lackingCount > 0 && `${whole(result.lackingCount)} without an estimate`,
    result.replacedCount > 0 && `${whole(result.replacedCount)} replaced`,
  ];
  return `${parts.filter(Boolean).join('; ')}.`;
}
