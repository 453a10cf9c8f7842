import type { Observation } from '@faintward/contracts/observations';
import Box from '@mui/material/Box';
import Tooltip from '@mui/material/Tooltip';
import type { ReactNode } from 'react';
import { formatDuration, formatNumber } from '../../../lib/format';
import type { TableColumn } from '../../../ui/DataTable';
import { RedshiftValue } from '../../../ui/RedshiftValue';
import { describeConditions, describeGoal, limitWords } from '../plan';

export const observationColumns: TableColumn<Observation>[] = [
  {
    field: 'targetName',
    headerName: 'Target',
    width: 150,
    renderCell: ({ row }) => <Clipped strong>{row.targetName}</Clipped>,
  },
  {
    field: 'redshift',
    headerName: 'Redshift',
    width: 92,
    numeric: true,
    renderCell: ({ row }) => <RedshiftValue redshift={row.redshift} />,
  },
  {
    field: 'modeName',
    headerName: 'Setup',
    minWidth: 150,
    flex: 1,
    renderCell: ({ row }) => (
      <Clipped title={`${row.telescopeName}, ${row.instrumentName}, ${row.modeName}`}>
        {row.instrumentName} · {row.modeName}
      </Clipped>
    ),
  },
  {
    field: 'totalSeconds',
    headerName: 'Time',
    unit: 'h',
    width: 76,
    computed: true,
    numeric: true,
    renderCell: ({ row }) => (row.totalSeconds === null ? '—' : formatNumber(row.totalSeconds / 3600, { decimals: 2 })),
  },
  {
    field: 'exposures',
    headerName: 'Exposures',
    width: 122,
    computed: true,
    numeric: true,
    sortable: false,
    valueGetter: (_value, row) => exposuresOf(row),
  },
  {
    field: 'signalToNoise',
    headerName: 'S/N',
    width: 68,
    computed: true,
    numeric: true,
    sortable: false,
    valueGetter: (_value, row) =>
      row.estimate?.outcome === 'feasible' ? formatNumber(row.estimate.signalToNoise, { significant: 3 }) : '—',
  },
  {
    field: 'outcome',
    headerName: 'Limited by',
    width: 168,
    computed: true,
    sortable: false,
    valueGetter: (_value, row) => outcomeOf(row).text,
    renderCell: ({ row }) => {
      const { text, tone } = outcomeOf(row);
      return (
        <Clipped title={text} colour={tone}>
          {tone !== undefined && <span aria-hidden="true">▲ </span>}
          {text}
        </Clipped>
      );
    },
  },
  {
    field: 'goal',
    headerName: 'Goal',
    width: 158,
    sortable: false,
    valueGetter: (_value, row) => describeGoal(row.goal),
    renderCell: ({ row }) => <Clipped title={describeGoal(row.goal)}>{describeGoal(row.goal)}</Clipped>,
  },
  {
    field: 'conditions',
    headerName: 'Conditions',
    width: 210,
    sortable: false,
    valueGetter: (_value, row) => describeConditions(row.conditions),
    renderCell: ({ row }) => (
      <Clipped title={describeConditions(row.conditions)}>{describeConditions(row.conditions)}</Clipped>
    ),
  },
];

function exposuresOf({ estimate, repeatCount }: Observation): string {
  if (estimate?.outcome !== 'feasible') return '—';
  const once = `${formatNumber(estimate.exposureCount, { decimals: 0 })} × ${formatDuration(estimate.exposureSeconds)}`;
  return repeatCount > 1 ? `${repeatCount} × (${once})` : once;
}

/** What holds an observation back, or why it gives no time, in words. */
export function outcomeOf({ estimate, lacking }: Observation): {
  text: string;
  tone: 'error.main' | 'warning.main' | undefined;
} {
  if (estimate === null) return { text: lacking ?? 'No estimate.', tone: 'warning.main' };
  if (estimate.outcome === 'infeasible')
    return { text: `Not feasible. ${estimate.reason.message}`, tone: 'error.main' };
  const caution = estimate.notices.find((notice) => notice.severity !== 'note');
  return {
    text: caution ? `${limitWords[estimate.limitedBy]}. ${caution.message}` : limitWords[estimate.limitedBy],
    tone: caution ? 'warning.main' : undefined,
  };
}

function Clipped({
  children,
  title,
  colour,
  strong = false,
}: {
  children: ReactNode;
  title?: string;
  colour?: string | undefined;
  strong?: boolean;
}) {
  const text = (
    <Box
      component="span"
      sx={{
        overflow: 'hidden',
        textOverflow: 'ellipsis',
        whiteSpace: 'nowrap',
        fontWeight: strong ? 600 : undefined,
        ...(colour ? { color: colour } : {}),
      }}
    >
      {children}
    </Box>
  );
  return title ? (
    <Tooltip title={title} describeChild>
      {text}
    </Tooltip>
  ) : (
    text
  );
}
