import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import { useQuery } from '@tanstack/react-query';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../app/paths';
import { proposalQueries } from '../features/proposals/api/proposals';
import { TimeRequestView } from '../features/proposals/components/TimeRequestView';
import { useProposal } from '../features/proposals/components/useProposal';
import { EmptyState } from '../ui/EmptyState';
import { Loaded } from '../ui/PageStates';

/** The request in hours. */
export function Component() {
  const { proposalId } = useProposal();
  const query = useQuery(proposalQueries.timeRequest(proposalId));
  return (
    <Loaded query={query} what="The request">
      {(request) =>
        request.rows.length === 0 && request.infeasibleCount === 0 && request.lackingCount === 0 ? (
          <EmptyState
            title="Nothing is asked for yet"
            action={
              <Button component={RouterLink} to={paths.proposalSection.to(proposalId, 'exposures')}>
                To the exposures
              </Button>
            }
          >
            The hours add up here once targets have a setup and a goal.
          </EmptyState>
        ) : (
          <Stack sx={{ gap: 2, alignItems: 'flex-start', '& > :first-of-type': { width: '100%' } }}>
            <TimeRequestView request={request} />
            <Button component={RouterLink} to={paths.proposalSection.to(proposalId, 'cosmologies')} variant="text">
              What the choice of cosmology changes
            </Button>
          </Stack>
        )
      }
    </Loaded>
  );
}
