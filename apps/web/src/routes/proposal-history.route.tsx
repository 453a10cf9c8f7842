import type { ProposalChange } from '@faintward/contracts/proposals';
import Box from '@mui/material/Box';
import Pagination from '@mui/material/Pagination';
import Typography from '@mui/material/Typography';
import { useQuery } from '@tanstack/react-query';
import { proposalQueries } from '../features/proposals/api/proposals';
import { useProposal } from '../features/proposals/components/useProposal';
import { useTableParams } from '../lib/useTableParams';
import { changeLines } from '../ui/changeWords';
import { EmptyState } from '../ui/EmptyState';
import { Loaded } from '../ui/PageStates';
import { Panel } from '../ui/Panel';
import { TimeDisplay } from '../ui/TimeDisplay';

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
            <Box component="ol" sx={{ listStyle: 'none', m: 0, p: 0 }}>
              {list.rows.map((entry) => (
                <Entry key={entry.changeId} entry={entry} />
              ))}
            </Box>
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

function Entry({ entry }: { entry: ProposalChange }) {
  return (
    <Box
      component="li"
      sx={{
        display: 'grid',
        gridTemplateColumns: { xs: '1fr', md: '200px 200px minmax(0, 1fr)' },
        gap: { xs: 0.25, md: 2 },
        borderTop: 1,
        borderColor: 'divider',
        px: { xs: 2, md: 2.5 },
        py: 1.25,
        fontSize: '0.875rem',
      }}
    >
      <Box sx={{ color: 'text.secondary' }}>
        <TimeDisplay instant={entry.at} short />
      </Box>
      <Box>{entry.personName ?? 'the system'}</Box>
      <Box sx={{ minWidth: 0, overflowWrap: 'anywhere' }}>
        {entry.subjectName || entry.subject} {entry.action}
        {changeLines(entry.changes)
          .slice(0, 8)
          .map((one) => (
            <Typography key={one.label} variant="body2" color="textSecondary">
              {one.label}: {one.before === '—' ? one.after : `${one.before} → ${one.after}`}
            </Typography>
          ))}
      </Box>
    </Box>
  );
}
