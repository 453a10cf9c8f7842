import type { ProposalChange } from '@faintward/contracts/proposals';
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { counted } from '../../../lib/format';
import { changeLines } from '../../../ui/changeWords';
import { TimeDisplay } from '../../../ui/TimeDisplay';

/** Lines of one change that are written out; the rest is counted. */
const shownLines = 8;

/** Who changed what and when, in the order given. */
export function ChangeList({
  entries,
  withSubject = true,
}: {
  entries: readonly ProposalChange[];
  /** False where all of them are about the thing that the page is about. */
  withSubject?: boolean;
}) {
  return (
    <Box component="ol" sx={{ listStyle: 'none', m: 0, p: 0 }}>
      {entries.map((entry) => (
        <Entry key={entry.changeId} entry={entry} withSubject={withSubject} />
      ))}
    </Box>
  );
}

function Entry({ entry, withSubject }: { entry: ProposalChange; withSubject: boolean }) {
  const lines = changeLines(entry.changes);
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
        {withSubject && `${entry.subjectName || entry.subject} `}
        {entry.action}
        {lines.slice(0, shownLines).map((one) => (
          <Typography key={one.label} variant="body2" color="textSecondary">
            {one.label}: {one.before === '—' ? one.after : `${one.before} → ${one.after}`}
          </Typography>
        ))}
        {lines.length > shownLines && (
          <Typography variant="body2" color="textSecondary">
            and {counted(lines.length - shownLines, 'other value')}
          </Typography>
        )}
      </Box>
    </Box>
  );
}
