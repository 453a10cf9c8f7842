import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import { useQuery } from '@tanstack/react-query';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../app/paths';
import { cosmologyQueries } from '../features/cosmologies/api/cosmologies';
import { CosmologiesView } from '../features/cosmologies/components/CosmologiesView';
import { useProposal } from '../features/proposals/components/useProposal';
import { EmptyState } from '../ui/EmptyState';
import { Loaded, SkeletonBlock } from '../ui/PageStates';

/** How much of a proposal hangs on its cosmology. */
export function Component() {
  const { proposalId } = useProposal();
  const query = useQuery(cosmologyQueries.ofProposal(proposalId));
  return (
    <Loaded
      query={query}
      what="The comparison of cosmologies"
      skeleton={
        <SkeletonBlock
          label="The comparison of cosmologies: loading"
          note="Comparing: every target and observation is computed in each cosmology, which takes some seconds."
        />
      }
    >
      {(comparison) =>
        comparison.targetCount === 0 ? (
          <EmptyState
            title="There is nothing to compare yet"
            action={
              <Button component={RouterLink} to={paths.proposalSection.to(proposalId, 'targets')}>
                To the targets
              </Button>
            }
          >
            Distances and times are compared once there are targets.
          </EmptyState>
        ) : (
          <Stack sx={{ gap: 2.5, alignItems: 'flex-start', '& > section': { width: '100%' } }}>
            <CosmologiesView comparison={comparison} />
            <Button component={RouterLink} to={paths.proposalSection.to(proposalId, 'time')} variant="text">
              Back to the time
            </Button>
          </Stack>
        )
      }
    </Loaded>
  );
}
