import Pagination from '@mui/material/Pagination';
import { useQuery } from '@tanstack/react-query';
import { proposalQueries } from '../features/proposals/api/proposals';
import { ChangeList } from '../features/proposals/components/ChangeList';
import { useProposal } from '../features/proposals/components/useProposal';
import { useTableParams } from '../lib/useTableParams';
import { EmptyState } from '../ui/EmptyState';
import { Loaded } from '../ui/PageStates';
import { Panel } from '../ui/Panel';

const pageSize = 50;

/** Who changed what, newest first. */
export function Component() {
  const { proposalId } = useProposal();
  const { page, change } = useTableParams();
  const query = useQuery(proposalQueries.history(proposalId, { page, pageSize }));
  return (
    <Loaded query={query} what="The history">
      {(list) =>
        list.rowCount === 0 ? (
          <EmptyState title="Nothing has been changed yet" />
        ) : (
          <Panel title="Who changed what" note="Newest first. Entries are never removed." flush>
            <ChangeList entries={list.rows} />
            {list.rowCount > pageSize && (
              <Pagination
                count={Math.ceil(list.rowCount / pageSize)}
                page={page}
                onChange={(_event, next) => change({ page: next })}
                sx={{ p: 2 }}
              />
            )}
          </Panel>
        )
      }
    </Loaded>
  );
}
