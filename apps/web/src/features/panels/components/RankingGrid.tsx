import type { Ranking, RankingRow } from '@faintward/contracts/reviews';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Typography from '@mui/material/Typography';
import { useMemo, useState } from 'react';
import { formatNumber } from '../../../lib/format';
import { DataTable, type TableColumn } from '../../../ui/DataTable';
import { EmptyState } from '../../../ui/EmptyState';
import { AwardDialog } from './AwardDialog';
import { CumulatedHours, hoursText, ScoreSpan } from './RankingCells';

/** The proposals of a panel in order, with what they ask for and the line where the hours run out. */
export function RankingGrid({ ranking }: { ranking: Ranking }) {
  const [deciding, setDeciding] = useState<string>();
  const [isInOrder, setIsInOrder] = useState(true);
  const { availableHours, isFinal } = ranking;
  const columns = useMemo<TableColumn<RankingRow>[]>(
    () => [
      {
        field: 'rank',
        headerName: 'Rank',
        width: 64,
        numeric: true,
        valueFormatter: (value: number | null) => value ?? '—',
      },
      {
        field: 'title',
        headerName: 'Proposal',
        flex: 1,
        minWidth: 240,
        renderCell: ({ row }) => (
          <Box sx={{ lineHeight: 1.3, whiteSpace: 'normal', py: 0.5 }}>
            <Typography variant="figure" component="span" color="textSecondary">
              {row.label}
            </Typography>{' '}
            <strong>{row.title}</strong>
            {row.partnerName && (
              <Box component="span" sx={{ display: 'block', color: 'text.secondary', fontSize: '0.8125rem' }}>
                {row.partnerName}
              </Box>
            )}
          </Box>
        ),
      },
      {
        field: 'meanScore',
        headerName: 'Mean score',
        unit: '0 to 10, with every score',
        width: 224,
        computed: true,
        renderCell: ({ row }) => <ScoreSpan row={row} />,
      },
      {
        field: 'spread',
        headerName: 'Spread',
        width: 76,
        numeric: true,
        computed: true,
        valueFormatter: (value: number | null) => formatNumber(value, { decimals: 2 }),
      },
      {
        field: 'scoreCount',
        headerName: 'Scores',
        unit: 'of assigned',
        width: 92,
        numeric: true,
        computed: true,
        renderCell: ({ row }) => `${row.scoreCount} of ${row.assignedCount}`,
      },
      {
        field: 'requestedTotalHours',
        headerName: 'Asked for',
        unit: 'h',
        width: 128,
        numeric: true,
        renderCell: ({ row }) => (
          <Box sx={{ lineHeight: 1.3, whiteSpace: 'normal' }}>{hoursText(row.requestedHours)}</Box>
        ),
      },
      {
        field: 'cumulatedHours',
        headerName: 'Cumulated',
        unit: 'h, the mark is what exists',
        width: 200,
        computed: true,
        sortable: false,
        renderCell: ({ row }) => <CumulatedHours row={row} available={availableHours} />,
      },
      {
        field: 'award',
        headerName: 'Award',
        width: 176,
        sortable: false,
        renderCell: ({ row }) => (
          <Button
            size="small"
            variant={row.award ? 'text' : 'outlined'}
            disabled={isFinal}
            onClick={() => setDeciding(row.proposalId)}
            aria-label={`Award for ${row.label}${row.award ? `, now ${awardText(row)}` : ''}`}
            sx={{ textAlign: 'left', lineHeight: 1.3, '&.Mui-disabled': { color: 'text.primary' } }}
          >
            {row.award ? awardText(row) : 'Decide'}
          </Button>
        ),
      },
    ],
    [availableHours, isFinal],
  );
  const row = ranking.rows.find((one) => one.proposalId === deciding);
  return (
    <>
      <DataTable
        label="Ranking"
        columns={columns}
        rows={ranking.rows}
        getRowId={(one) => one.proposalId}
        what="proposals"
        empty={
          <EmptyState title="No proposal has been submitted to this panel">
            They appear here once the deadline of the call has passed.
          </EmptyState>
        }
        grid={{
          rowHeight: 62,
          onSortModelChange: (model) =>
            setIsInOrder(model.length === 0 || (model[0]?.field === 'rank' && model[0].sort === 'asc')),
          getRowClassName: ({ id }) =>
            isInOrder && ranking.cutAfterRow !== null && ranking.rows[ranking.cutAfterRow - 1]?.proposalId === id
              ? 'cut-below'
              : '',
          sx: {
            // Drawn over the cells, whose own ground would hide it.
            '& .cut-below': { position: 'relative' },
            '& .cut-below::after': {
              content: '""',
              position: 'absolute',
              left: 0,
              right: 0,
              bottom: -1,
              height: '3px',
              bgcolor: 'faintward.accent',
              zIndex: 1,
              pointerEvents: 'none',
            },
            '& .MuiDataGrid-cell': { display: 'flex', alignItems: 'center' },
          },
        }}
      />
      {row && (
        <AwardDialog key={row.proposalId} panelId={ranking.panelId} row={row} onClose={() => setDeciding(undefined)} />
      )}
    </>
  );
}

function awardText(row: RankingRow): string {
  if (!row.award) return '';
  if (row.award.hours === 0) return 'declined';
  return `${formatNumber(row.award.hours, { decimals: 1 })} h ${row.award.moonClass}, ${row.award.standing}`;
}
