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
    width: 176,
    renderCell: ({ row }) => <Clipped strong>{row.targetName}</Clipped>,
  },
  {
    field: 'redshift',
    headerName: 'Redshift',
    width: 86,
    numeric: true,
    renderCell: ({ row }) => <RedshiftValue redshift={row.redshift} />,
  },
  {
    field: 'modeName',
    headerName: 'Setup',
    width: 174,
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
    width: 64,
    computed: true,
    numeric: true,
    renderCell: ({ row }) => (row.totalSeconds === null ? '—' : formatNumber(row.totalSeconds / 3600, { decimals: 2 })),
  },
  {
    field: 'exposures',
    headerName: 'Exposures',
    width: 112,
    computed: true,
    numeric: true,
    sortable: false,
    valueGetter: (_value, row) => exposuresOf(row),
  },
  {
    field: 'signalToNoise',
    headerName: 'S/N',
    width: 60,
    computed: true,
    numeric: true,
    sortable: false,
    valueGetter: (_value, row) =>
      row.estimate?.outcome === 'feasible' ? formatNumber(row.estimate.signalToNoise, { significant: 3 }) : '—',
  },
  {
    field: 'limitedBy',
    headerName: 'Limited by',
    width: 104,
    computed: true,
    sortable: false,
    valueGetter: (_value, row) => (row.estimate?.outcome === 'feasible' ? limitWords[row.estimate.limitedBy] : '—'),
  },
  {
    field: 'notices',
    headerName: 'Notices',
    minWidth: 168,
    flex: 1,
    computed: true,
    sortable: false,
    valueGetter: (_value, row) => noticeOf(row)?.text ?? '',
    renderCell: ({ row }) => {
      const notice = noticeOf(row);
      return (
        notice && (
          <Clipped title={notice.text} colour={notice.tone}>
            <span aria-hidden="true">▲ </span>
            {notice.text}
          </Clipped>
        )
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

/** Why an observation gives no time, or what speaks against it, in words. */
function noticeOf({ estimate, lacking }: Observation): { text: string; tone: string } | undefined {
  if (estimate === null) return { text: lacking ?? 'No estimate.', tone: 'warning.main' };
  if (estimate.outcome === 'infeasible')
    return { text: `Not feasible. ${estimate.reason.message}`, tone: 'error.main' };
  const cautions = estimate.notices.filter((notice) => notice.severity !== 'note');
  return cautions.length === 0
    ? undefined
    : { text: cautions.map((notice) => notice.message).join(' '), tone: 'warning.main' };
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
