import Button from '@mui/material/Button';
import Pagination from '@mui/material/Pagination';
import { useQuery } from '@tanstack/react-query';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../app/paths';
import { proposalQueries } from '../features/proposals/api/proposals';
import { ProposalList } from '../features/proposals/components/ProposalList';
import { useTableParams } from '../lib/useTableParams';
import { EmptyState } from '../ui/EmptyState';
import { PageFrame } from '../ui/PageFrame';
import { Loaded } from '../ui/PageStates';

const pageSize = 50;

/** One's proposals. */
export function Component() {
  const { page, change } = useTableParams();
  const query = useQuery(proposalQueries.list({ page, pageSize }));
  const begin = (
    <Button component={RouterLink} to={paths.newProposal.to()} variant="contained">
      Begin a proposal
    </Button>
  );
  return (
    <PageFrame title="My proposals" actions={begin}>
      <Loaded query={query} what="Your proposals">
        {(list) =>
          list.rowCount === 0 ? (
            <EmptyState title="You are on no proposal yet" action={begin}>
              Begin one for an open call, or ask the principal investigator of one to add you to the team.
            </EmptyState>
          ) : (
            <>
              <ProposalList proposals={list.rows} />
              {list.rowCount > pageSize && (
                <Pagination
                  count={Math.ceil(list.rowCount / pageSize)}
                  page={page}
                  onChange={(_event, next) => change({ page: next })}
                  sx={{ mt: 2 }}
                />
              )}
            </>
          )
        }
      </Loaded>
    </PageFrame>
  );
}
