import type { Proposal } from '@faintward/contracts/proposals';
import type { CheckReport, SubmissionSummary } from '@faintward/contracts/submissions';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useState } from 'react';
import { newIdempotencyKey } from '../../../lib/api';
import { counted } from '../../../lib/format';
import { ConfirmDialog } from '../../../ui/ConfirmDialog';
import { useNotices } from '../../../ui/Notices';
import { Panel } from '../../../ui/Panel';
import { TimeDisplay } from '../../../ui/TimeDisplay';
import { useSubmitProposal, useWithdrawProposal } from '../api/proposals';
import { describeHours } from './words';

/** Submitting, submitting again, withdrawing. */
export function SubmitPanel({ proposal, report }: { proposal: Proposal; report: CheckReport }) {
  const submit = useSubmitProposal(proposal.proposalId);
  const withdraw = useWithdrawProposal(proposal.proposalId);
  const announce = useNotices();
  const [asking, setAsking] = useState<'submit' | 'withdraw'>();
  // One key for one intention: a retry after a lost answer must not submit twice.
  const [key, setKey] = useState(newIdempotencyKey);
  const again = proposal.state === 'submitted';
  const { canSubmit, canWithdraw } = proposal.abilities;
  return (
    <Panel
      title={again ? 'Submit again' : 'Submit'}
      note={
        <>
          Until <TimeDisplay instant={proposal.deadlineAt} siteTimeZone={proposal.siteTimeZone} />. A submission freezes
          every input and every number; you get a receipt by e-mail.
        </>
      }
    >
      {!canSubmit && !canWithdraw && (
        <Typography color="textSecondary">
          {proposal.state === 'draft' || proposal.state === 'submitted'
            ? 'Only the principal investigator submits or withdraws, until the deadline.'
            : 'This proposal can no longer be submitted or withdrawn.'}
        </Typography>
      )}
      <Stack direction="row" sx={{ gap: 1.25, flexWrap: 'wrap' }}>
        {canSubmit && (
          <Button variant="contained" disabled={!report.canSubmit} onClick={() => setAsking('submit')}>
            {again ? 'Submit the changed proposal' : 'Submit the proposal'}
          </Button>
        )}
        {canWithdraw && <Button onClick={() => setAsking('withdraw')}>Withdraw the proposal</Button>}
      </Stack>
      <ConfirmDialog
        open={asking === 'submit'}
        title={again ? 'Submit the changed proposal?' : 'Submit the proposal?'}
        confirmLabel="Submit"
        pending={submit.isPending}
        error={submit.error}
        onCancel={() => {
          setAsking(undefined);
          submit.reset();
        }}
        onConfirm={() =>
          submit.mutate(key, {
            onSuccess: (submission) => {
              setAsking(undefined);
              setKey(newIdempotencyKey());
              announce(`Submitted. Fingerprint ${submission.fingerprint.slice(0, 12)}.`);
            },
          })
        }
      >
        <Typography>
          The committee will read it as it is now: {describeHours(proposal.requestedHours)}.
          {report.warningCount > 0 && ` ${counted(report.warningCount, 'warning')} will be submitted with it.`}
        </Typography>
      </ConfirmDialog>
      <ConfirmDialog
        open={asking === 'withdraw'}
        title="Withdraw the proposal?"
        confirmLabel="Withdraw the proposal"
        destructive
        pending={withdraw.isPending}
        error={withdraw.error}
        onCancel={() => {
          setAsking(undefined);
          withdraw.reset();
        }}
        onConfirm={() => withdraw.mutate(undefined, { onSuccess: () => setAsking(undefined) })}
      >
        The committee will not see it. What was written stays readable for the team.
      </ConfirmDialog>
    </Panel>
  );
}

/** What has been submitted so far, newest first. */
export function SubmissionHistory({ submissions }: { submissions: readonly SubmissionSummary[] }) {
  if (submissions.length === 0) return null;
  return (
    <Panel title="Submissions" flush>
      <Box component="ol" sx={{ listStyle: 'none', m: 0, p: 0 }}>
        {submissions.map((submission) => (
          <Box
            component="li"
            key={submission.submissionId}
            sx={{ borderTop: 1, borderColor: 'divider', px: { xs: 2, md: 2.5 }, py: 1.25, fontSize: '0.875rem' }}
          >
            <strong>Submission {submission.number}</strong>
            {submission.isCurrent ? ', the one that counts' : ', superseded'}
            <Box sx={{ color: 'text.secondary' }}>
              <TimeDisplay instant={submission.submittedAt} short /> · {submission.submittedByName} ·{' '}
              {counted(submission.targetCount, 'target')} · {describeHours(submission.requestedHours)}
            </Box>
            <Typography variant="figure" component="div" sx={{ color: 'text.secondary', overflowWrap: 'anywhere' }}>
              {submission.fingerprint}
            </Typography>
          </Box>
        ))}
      </Box>
    </Panel>
  );
}
