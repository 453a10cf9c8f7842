import type { Ranking } from '@faintward/contracts/reviews';
import type { HoursByMoonClass } from '@faintward/contracts/semesters';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Table from '@mui/material/Table';
import TableBody from '@mui/material/TableBody';
import TableCell from '@mui/material/TableCell';
import TableHead from '@mui/material/TableHead';
import TableRow from '@mui/material/TableRow';
import Typography from '@mui/material/Typography';
import { useState } from 'react';
import { apiUrl } from '../../../lib/api';
import { counted, formatNumber } from '../../../lib/format';
import { ConfirmDialog } from '../../../ui/ConfirmDialog';
import { Note } from '../../../ui/Note';
import { Panel } from '../../../ui/Panel';
import { Explained } from '../../../ui/Quantity';
import { useAwards } from '../api/panels';
import { RankingGrid } from './RankingGrid';

const classes = ['dark', 'grey', 'bright'] as const;
const hours = (value: number) => formatNumber(value, { decimals: 1 });

/** The ranking, what exists against what is awarded, how the reviewers score, and closing it. */
export function RankingView({ ranking }: { ranking: Ranking }) {
  return (
    <Stack sx={{ gap: 2.25 }}>
      {ranking.isFinal && <Note tone="good">This ranking is final: scores and awards can no longer be changed.</Note>}
      {ranking.hiddenCount > 0 && (
        <Note>
          {counted(ranking.hiddenCount, 'proposal')} of this panel {ranking.hiddenCount === 1 ? 'is' : 'are'} kept from
          you for a conflict, and {ranking.hiddenCount === 1 ? 'counts' : 'count'} in no number on this page.
        </Note>
      )}
      <Box>
        <RankingGrid ranking={ranking} />
        <Typography variant="body2" sx={{ color: 'secondary.main', mt: 0.75 }} aria-live="polite">
          {describeCut(ranking)}
        </Typography>
        <Typography variant="body2" color="textSecondary">
          {ranking.method}
        </Typography>
      </Box>
      <Box
        sx={{
          display: 'grid',
          gridTemplateColumns: { xs: 'minmax(0, 1fr)', lg: '1fr 1fr' },
          gap: 2.25,
          alignItems: 'start',
        }}
      >
        <HoursPanel ranking={ranking} />
        <ReviewersPanel ranking={ranking} />
      </Box>
    </Stack>
  );
}

function describeCut(ranking: Ranking): string {
  if (ranking.rows.length === 0) return '';
  if (ranking.cutAfterRow === null) return 'No cut line: the hours suffice for every proposal here.';
  const next = ranking.rows[ranking.cutAfterRow];
  const which = next?.exhaustedMoonClass ? `${next.exhaustedMoonClass} hours run out` : 'the hours run out';
  return ranking.cutAfterRow === 0
    ? `Cut line: ${which} at the first proposal.`
    : `Cut line: ${which} after ${counted(ranking.cutAfterRow, 'proposal')}. Decisions move it.`;
}

function HoursPanel({ ranking }: { ranking: Ranking }) {
  const rows: { label: string; value: HoursByMoonClass }[] = [
    { label: 'exist', value: ranking.availableHours },
    { label: 'asked for', value: ranking.requestedHours },
    { label: 'awarded', value: ranking.awardedHours },
  ];
  return (
    <Panel title="Hours by moon class" flush>
      <Table size="small">
        <TableHead>
          <TableRow>
            <TableCell />
            {classes.map((moonClass) => (
              <TableCell key={moonClass} align="right">
                {moonClass}
                <Box component="small" sx={{ display: 'block', fontWeight: 400 }}>
                  h
                </Box>
              </TableCell>
            ))}
          </TableRow>
        </TableHead>
        <TableBody>
          {rows.map((row) => (
            <TableRow key={row.label}>
              <TableCell component="th" scope="row">
                {row.label}
              </TableCell>
              {classes.map((moonClass) => (
                <TableCell key={moonClass} align="right">
                  {hours(row.value[moonClass])}
                </TableCell>
              ))}
            </TableRow>
          ))}
          <TableRow>
            <TableCell component="th" scope="row">
              asked for / exist
            </TableCell>
            {classes.map((moonClass) => (
              <TableCell key={moonClass} align="right">
                {ranking.availableHours[moonClass] > 0
                  ? formatNumber(ranking.requestedHours[moonClass] / ranking.availableHours[moonClass], { decimals: 2 })
                  : '—'}
              </TableCell>
            ))}
          </TableRow>
        </TableBody>
      </Table>
    </Panel>
  );
}

function ReviewersPanel({ ranking }: { ranking: Ranking }) {
  return (
    <Panel title="How the reviewers score" note="For information: it does not enter the order." flush>
      <Table size="small">
        <TableHead>
          <TableRow>
            <TableCell>Reviewer</TableCell>
            <TableCell align="right">Scores</TableCell>
            <TableCell align="right">Mean</TableCell>
            <TableCell align="right">
              <Explained
                explanation={{
                  title: 'Leniency',
                  meaning:
                    'How much higher this reviewer scores than the others do the same proposals: the offset in a model that gives each proposal a quality and each reviewer an offset. Unknown where too few proposals are shared to tell.',
                  formula: 'score = quality of the proposal + leniency of the reviewer, fitted by least squares',
                }}
              >
                Leniency
              </Explained>
            </TableCell>
          </TableRow>
        </TableHead>
        <TableBody>
          {ranking.reviewers.map((reviewer) => (
            <TableRow key={reviewer.name}>
              <TableCell>{reviewer.name}</TableCell>
              <TableCell align="right">{reviewer.scoreCount}</TableCell>
              <TableCell align="right">{formatNumber(reviewer.meanScore, { decimals: 2 })}</TableCell>
              <TableCell align="right">{formatNumber(reviewer.leniency, { decimals: 2, signed: true })}</TableCell>
            </TableRow>
          ))}
        </TableBody>
      </Table>
    </Panel>
  );
}

/** Export and closing, for the head of the page. */
export function RankingActions({ ranking }: { ranking: Ranking }) {
  const { finalise } = useAwards(ranking.panelId);
  const [asking, setAsking] = useState(false);
  const undecided = ranking.rows.filter((row) => row.award === null).length;
  return (
    <>
      <Button component="a" href={apiUrl(`/panels/${ranking.panelId}/ranking.csv`)} download>
        Download CSV
      </Button>
      {!ranking.isFinal && (
        <Button variant="contained" onClick={() => setAsking(true)} disabled={ranking.rows.length === 0}>
          Finalise
        </Button>
      )}
      <ConfirmDialog
        open={asking}
        title="Finalise this ranking?"
        confirmLabel="Finalise"
        pending={finalise.isPending}
        error={finalise.error}
        onCancel={() => {
          setAsking(false);
          finalise.reset();
        }}
        onConfirm={() => finalise.mutate(undefined, { onSuccess: () => setAsking(false) })}
      >
        Scores and awards are closed, and the teams see the decision.
        {undecided > 0 && ` ${counted(undecided, 'proposal')} without an award will be declined.`}
      </ConfirmDialog>
    </>
  );
}
