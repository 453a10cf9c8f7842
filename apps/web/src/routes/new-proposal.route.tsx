import { NewProposal } from '@faintward/contracts/proposals';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import { useQuery } from '@tanstack/react-query';
import { Navigate } from 'react-router-dom';
import { paths } from '../app/paths';
import { useCreateProposal } from '../features/proposals/api/proposals';
import { sessionQueries } from '../lib/queries/session';
import { EmptyState } from '../ui/EmptyState';
import { PageFrame } from '../ui/PageFrame';
import { Loaded } from '../ui/PageStates';
import { ProblemDisplay } from '../ui/ProblemDisplay';
import { LeaveGuard } from '../ui/form/LeaveGuard';
import { SelectField, TextField } from '../ui/form/fields';
import { showServerErrors, useZodForm } from '../ui/form/useZodForm';
import { describeInstant } from '../lib/time';

/** Begins a proposal for an open call. */
export function Component() {
  const query = useQuery(sessionQueries.calls());
  return (
    <PageFrame
      title="A new proposal"
      width="reading"
      breadcrumbs={[{ label: 'My proposals', to: paths.proposals.to() }]}
    >
      <Loaded query={query} what="The open calls">
        {({ calls, siteTimeZone }) => {
          const open = calls.filter((call) => call.stage === 'open');
          if (open.length === 0) {
            return <EmptyState title="No call is open now">The front page says when the next one opens.</EmptyState>;
          }
          return (
            <NewProposalForm
              calls={open.map((call) => ({
                value: call.semesterId,
                label: `${call.name}, closes ${describeInstant(new Date(call.deadlineAt), siteTimeZone)}`,
              }))}
            />
          );
        }}
      </Loaded>
    </PageFrame>
  );
}

function NewProposalForm({ calls }: { calls: readonly { value: string; label: string }[] }) {
  const create = useCreateProposal();
  const form = useZodForm(NewProposal, { defaultValues: { semesterId: calls[0]?.value ?? '', title: '' } });
  const submit = form.handleSubmit((input) =>
    create.mutateAsync(input).then(
      () => undefined,
      (error: unknown) => void showServerErrors(form, error, ['title', 'semesterId']),
    ),
  );
  // Drawn instead of the form, so that its guard against leaving is gone before the page is left.
  if (create.data) return <Navigate to={paths.proposalSection.to(create.data.proposalId, 'targets')} replace />;
  return (
    <form onSubmit={(event) => void submit(event)} noValidate>
      <LeaveGuard when={form.formState.isDirty} what="The title" />
      <Stack component="fieldset" disabled={create.isPending} sx={{ border: 0, p: 0, m: 0, minWidth: 0, gap: 2.5 }}>
        <SelectField control={form.control} name="semesterId" label="Call" options={calls} fullWidth />
        <TextField
          control={form.control}
          name="title"
          label="Title"
          helperText="What the committee reads first. It can be changed until the deadline."
          fullWidth
          autoFocus
        />
        {create.error && <ProblemDisplay error={create.error} what="The proposal could not be begun" />}
        <div>
          <Button type="submit" variant="contained" loading={create.isPending}>
            Begin the proposal
          </Button>
        </div>
      </Stack>
    </form>
  );
}
