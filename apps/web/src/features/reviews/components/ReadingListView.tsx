import type { ReadingList, ReadingListEntry, ReviewState } from '@faintward/contracts/reviews';
import Box from '@mui/material/Box';
import LinearProgress from '@mui/material/LinearProgress';
import Link from '@mui/material/Link';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../../../app/paths';
import { counted, formatNumber } from '../../../lib/format';
import { groupBy } from '../../../lib/groupBy';
import { Note } from '../../../ui/Note';
import { Panel } from '../../../ui/Panel';
import { TimeDisplay } from '../../../ui/TimeDisplay';

const stateWords: Record<ReviewState, string> = {
  toRead: 'to read',
  begun: 'begun',
  complete: 'complete',
  conflict: 'conflict',
};

/** What one has to read, panel by panel, with how far one has come. */
export function ReadingListView({ list }: { list: ReadingList }) {
  const panels = groupBy(list.rows, (row) => row.panelId);
  const complete = list.rows.filter((row) => row.state === 'complete').length;
  return (
    <Stack sx={{ gap: 2.25 }}>
      <Box>
        <Typography sx={{ mb: 0.75 }}>
          {complete} of {counted(list.rows.length, 'review')} complete
          {list.reviewsDueAt && (
            <>
              , due <TimeDisplay instant={list.reviewsDueAt} short />
            </>
          )}
        </Typography>
        <LinearProgress
          variant="determinate"
          aria-label="Reviews complete"
          value={list.rows.length === 0 ? 0 : (100 * complete) / list.rows.length}
          sx={{ height: 6, borderRadius: 3, maxWidth: 420 }}
        />
      </Box>
      {list.conflictCount > 0 && (
        <Note>
          {counted(list.conflictCount, 'proposal')} of your panels {list.conflictCount === 1 ? 'is' : 'are'} kept from
          you for a conflict.
        </Note>
      )}
      {[...panels.values()].map((rows) => (
        <Panel key={rows[0]?.panelId} title={rows[0]?.panelName} note={rows[0]?.semesterName} flush>
          <Box component="ul" sx={{ listStyle: 'none', m: 0, p: 0 }}>
            {rows.map((row) => (
              <Entry key={row.proposalId} row={row} />
            ))}
          </Box>
        </Panel>
      ))}
    </Stack>
  );
}

function Entry({ row }: { row: ReadingListEntry }) {
  const hours = row.requestedHours.dark + row.requestedHours.grey + row.requestedHours.bright;
  return (
    <Box
      component="li"
      sx={{
        display: 'grid',
        gridTemplateColumns: { xs: 'minmax(0, 1fr) auto', md: 'minmax(0, 1fr) 180px 120px 90px' },
        columnGap: 2,
        rowGap: 0.25,
        alignItems: 'baseline',
        borderTop: 1,
        borderColor: 'divider',
        px: { xs: 2, md: 2.5 },
        py: 1.25,
      }}
    >
      <Box sx={{ minWidth: 0 }}>
        <Typography variant="figure" component="span" color="textSecondary">
          {row.label}
        </Typography>{' '}
        <Link component={RouterLink} to={paths.review.to(row.proposalId)} color="text.primary" sx={{ fontWeight: 600 }}>
          {row.title}
        </Link>
        {row.isLead && (
          <Typography component="span" variant="body2" color="textSecondary">
            {' '}
            · lead reviewer
          </Typography>
        )}
      </Box>
      <Typography variant="body2" color="textSecondary" sx={{ display: { xs: 'none', md: 'block' } }}>
        {counted(row.targetCount, 'target')}, {formatNumber(hours, { decimals: 1 })} h
      </Typography>
      <Typography variant="body2" sx={{ color: row.state === 'complete' ? 'success.main' : 'text.secondary' }}>
        {stateWords[row.state]}
      </Typography>
      <Box sx={{ textAlign: 'right', fontVariantNumeric: 'tabular-nums', display: { xs: 'none', md: 'block' } }}>
        {row.overallScore === null ? '—' : `${formatNumber(row.overallScore, { decimals: 1 })} of 10`}
      </Box>
    </Box>
  );
}
