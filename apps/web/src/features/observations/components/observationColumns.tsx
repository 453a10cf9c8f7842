import type { Observation } from '@faintward/contracts/observations';
import Box from '@mui/material/Box';
import Tooltip from '@mui/material/Tooltip';
import type { ReactNode } from 'react';
import { bySeverity } from '../../../lib/bySeverity';
import { counted, formatDuration, formatNumber } from '../../../lib/format';
import type { TableColumn } from '../../../ui/DataTable';
import { RedshiftValue } from '../../../ui/RedshiftValue';
import { limitWords } from '../../../ui/estimate/estimateWords';
import { describeConditions, describeGoal, shortConditions } from '../plan';

export const observationColumns: TableColumn<Observation>[] = [
  {
    field: 'targetName',
    headerName: 'Target',
    width: 170,
    renderCell: ({ row }) => <Clipped strong>{row.targetName}</Clipped>,
  },
  {
    field: 'redshift',
    headerName: 'Redshift',
    width: 82,
    numeric: true,
    renderCell: ({ row }) => <RedshiftValue redshift={row.redshift} />,
  },
  {
    field: 'modeName',
    headerName: 'Setup',
    width: 142,
    renderCell: ({ row }) => (
      <Clipped lines={2} title={`${row.telescopeName}, ${row.instrumentName}, ${row.modeName}`}>
        {row.instrumentName} · {row.modeName}
      </Clipped>
    ),
  },
  {
    field: 'totalSeconds',
    headerName: 'Time',
    unit: 'h',
    width: 60,
    computed: true,
    numeric: true,
    renderCell: ({ row }) => (row.totalSeconds === null ? '—' : formatNumber(row.totalSeconds / 3600, { decimals: 2 })),
  },
  {
    field: 'exposures',
    headerName: 'Exposures',
    width: 108,
    computed: true,
    numeric: true,
    sortable: false,
    valueGetter: (_value, row) => exposuresOf(row),
  },
  {
    field: 'signalToNoise',
    headerName: 'S/N',
    width: 56,
    computed: true,
    numeric: true,
    sortable: false,
    valueGetter: (_value, row) =>
      row.estimate?.outcome === 'feasible' ? formatNumber(row.estimate.signalToNoise, { significant: 3 }) : '—',
  },
  {
    field: 'limitedBy',
    headerName: 'Limited by',
    width: 94,
    computed: true,
    sortable: false,
    valueGetter: (_value, row) => (row.estimate?.outcome === 'feasible' ? limitWords[row.estimate.limitedBy] : '—'),
  },
  {
    field: 'notices',
    headerName: 'Notices',
    minWidth: 250,
    flex: 1,
    computed: true,
    sortable: false,
    valueGetter: (_value, row) => noticeOf(row)?.text ?? '',
    renderCell: ({ row }) => {
      const notice = noticeOf(row);
      return (
        notice && (
          <Clipped lines={3} title={notice.all} colour={notice.tone}>
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
    width: 112,
    sortable: false,
    valueGetter: (_value, row) => describeGoal(row.goal),
    renderCell: ({ row }) => (
      <Clipped lines={2} title={describeGoal(row.goal)}>
        {describeGoal(row.goal)}
      </Clipped>
    ),
  },
  {
    field: 'conditions',
    headerName: 'Conditions',
    width: 140,
    sortable: false,
    valueGetter: (_value, row) => describeConditions(row.conditions),
    renderCell: ({ row }) => (
      <Clipped lines={2} title={describeConditions(row.conditions)}>
        {shortConditions(row.conditions)}
      </Clipped>
    ),
  },
];

function exposuresOf({ estimate, repeatCount }: Observation): string {
  if (estimate?.outcome !== 'feasible') return '—';
  const once = `${formatNumber(estimate.exposureCount, { decimals: 0 })} × ${formatDuration(estimate.exposureSeconds)}`;
  return repeatCount > 1 ? `${repeatCount} × (${once})` : once;
}

interface RowNotice {
  /** The most severe one, with the number of the others. */
  text: string;
  all: string;
  tone: string;
}

/** Why an observation gives no time, or what speaks against it, in words. */
export function noticeOf({ estimate, lacking }: Observation): RowNotice | undefined {
  if (estimate === null) return one(lacking ?? 'No estimate.', 'warning.main');
  if (estimate.outcome === 'infeasible') return one(`Not feasible. ${estimate.reason.message}`, 'error.main');
  const cautions = bySeverity(estimate.notices.filter((notice) => notice.severity !== 'note'));
  const [first, ...others] = cautions;
  if (!first) return undefined;
  return {
    text: others.length > 0 ? `${first.message} And ${counted(others.length, 'other')}.` : first.message,
    all: cautions.map((notice) => notice.message).join(' '),
    tone: first.severity === 'error' ? 'error.main' : 'warning.main',
  };
}

const one = (text: string, tone: string): RowNotice => ({ text, all: text, tone });

/** Cautions are sentences: a row with one has room for three lines, any other for two. */
export const observationRowHeight = (row: Observation) => (noticeOf(row) ? 58 : 42);

/** A text of so many lines at most; all of it is in its title and in the opened row. */
function Clipped({
  children,
  title,
  colour,
  strong = false,
  lines = 1,
}: {
  children: ReactNode;
  title?: string;
  colour?: string | undefined;
  strong?: boolean;
  lines?: number;
}) {
  const text = (
    <Box
      component="span"
      sx={{
        overflow: 'hidden',
        fontWeight: strong ? 600 : undefined,
        ...(lines === 1
          ? { textOverflow: 'ellipsis', whiteSpace: 'nowrap' }
          : {
              display: '-webkit-box',
              WebkitBoxOrient: 'vertical',
              WebkitLineClamp: String(lines),
              whiteSpace: 'normal',
              fontSize: '0.8125rem',
              lineHeight: 1.3,
            }),
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
