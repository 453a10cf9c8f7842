import Stack from '@mui/material/Stack';
import { useQuery } from '@tanstack/react-query';
import { proposalQueries } from '../features/proposals/api/proposals';
import { CheckFindings } from '../features/proposals/components/CheckFindings';
import { SubmissionHistory, SubmitPanel } from '../features/proposals/components/SubmitPanel';
import { useProposal } from '../features/proposals/components/useProposal';
import { Loaded } from '../ui/PageStates';

/** The checks, and submitting. */
export function Component() {
  const proposal = useProposal();
  const checks = useQuery(proposalQueries.checks(proposal.proposalId));
  const submissions = useQuery(proposalQueries.submissions(proposal.proposalId));
  return (
    <Stack sx={{ gap: 2.25, maxWidth: 900 }}>
      <Loaded query={checks} what="The checks">
        {(report) => (
          <Stack sx={{ gap: 2.25 }}>
            <CheckFindings proposalId={proposal.proposalId} report={report} />
            <SubmitPanel proposal={proposal} report={report} />
          </Stack>
        )}
      </Loaded>
      <Loaded query={submissions} what="The submissions">
        {(list) => <SubmissionHistory submissions={list.rows} />}
      </Loaded>
    </Stack>
  );
}
