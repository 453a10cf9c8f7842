import type { Target } from '@faintward/contracts/targets';
import MoreVertIcon from '@mui/icons-material/MoreVert';
import Box from '@mui/material/Box';
import IconButton from '@mui/material/IconButton';
import Link from '@mui/material/Link';
import Tooltip from '@mui/material/Tooltip';
import type { ReactNode } from 'react';
import { formatNumber, type NumberFormat } from '../../../lib/format';
import type { TableColumn } from '../../../ui/DataTable';
import { RedshiftValue } from '../../../ui/RedshiftValue';
import { visuallyHidden } from '../../../ui/visuallyHidden';
import { cellOfField, redshiftDecimals, storedText, type CellName, type EditableField } from '../cells';
import { describeExtent } from '../../../ui/light/lightWords';
import { lightColumns } from './lightColumns';
import { NoticesCell } from './NoticesCell';
import { draftKey, type CellDraft, type Drafts } from '../hooks/useCellEdits';

/** A target with what is typed over it: the fields that can be typed into hold texts. */
export interface TargetRow extends Record<EditableField, string> {
  target: Target;
  drafts: Partial<Record<CellName, CellDraft>>;
  isSaving: boolean;
}

export function toTargetRow(target: Target, drafts: Drafts): TargetRow {
  const own: TargetRow['drafts'] = {};
  const texts = {} as Record<EditableField, string>;
  for (const [field, cell] of Object.entries(cellOfField) as [EditableField, CellName][]) {
    const draft = drafts.get(draftKey(target.targetId, cell));
    if (draft) own[cell] = draft;
    texts[field] = draft?.text ?? storedText(target, cell);
  }
  return { ...texts, target, drafts: own, isSaving: Object.values(own).some((draft) => draft.state === 'saving') };
}

export interface ColumnActions {
  canEdit: boolean;
  onOpen: (targetId: string) => void;
  onMenu: (target: Target, anchor: HTMLElement) => void;
}

export function targetColumns({ canEdit, onOpen, onMenu }: ColumnActions): TableColumn<TargetRow>[] {
  const typed = (
    field: EditableField,
    column: Omit<TableColumn<TargetRow>, 'field' | 'renderCell'>,
    draw: (row: TargetRow) => ReactNode = (row) => <Clipped text={row[field]} />,
  ): TableColumn<TargetRow> => ({
    field,
    editable: canEdit,
    sortable: false,
    ...column,
    cellClassName: ({ row }) => {
      const draft = row.drafts[cellOfField[field]];
      return draft ? (draft.state === 'saving' ? 'saving' : 'faulty') : '';
    },
    renderCell: ({ row }) => {
      const draft = row.drafts[cellOfField[field]];
      return draft ? <DraftText draft={draft} /> : draw(row);
    },
  });
  const computed = (
    field: string,
    headerName: string,
    unit: string,
    width: number,
    read: (target: Target) => number | null,
    format: NumberFormat,
    sortable = false,
  ): TableColumn<TargetRow> => ({
    field,
    headerName,
    unit,
    width,
    sortable,
    computed: true,
    numeric: true,
    valueGetter: (_value, row) => read(row.target),
    renderCell: ({ row }) => formatNumber(read(row.target), format),
  });
  return [
    typed('name', { headerName: 'Target', width: 170, sortable: true }, ({ name, target }) => (
      <Link
        component="button"
        tabIndex={-1}
        onClick={() => onOpen(target.targetId)}
        title="Open the target sheet"
        sx={{ fontWeight: 600, overflow: 'hidden', textOverflow: 'ellipsis', color: 'text.primary', textAlign: 'left' }}
      >
        {name}
      </Link>
    )),
    typed('rightAscensionDeg', { headerName: 'Right ascension', unit: 'ICRS', width: 118, sortable: true }, coordinate),
    typed('declinationDeg', { headerName: 'Declination', unit: 'ICRS', width: 106, sortable: true }, (row) =>
      coordinate(row, 'declinationDeg'),
    ),
    typed('redshift', { headerName: 'Redshift', width: 86, sortable: true, numeric: true }, ({ target }) => (
      <RedshiftValue redshift={target.redshift} decimals={redshiftDecimals(target.redshift)} />
    )),
    typed('redshiftUncertainty', { headerName: '± z', unit: '1 σ', width: 96, numeric: true }, (row) =>
      row.redshiftUncertainty === '' ? '—' : <Clipped text={row.redshiftUncertainty} />,
    ),
    typed('brightnessText', { headerName: 'Brightness', unit: 'as known', width: 232 }, ({ brightnessText }) =>
      brightnessText === '' ? <Quiet>not given</Quiet> : <Clipped text={brightnessText} />,
    ),
    ...lightColumns(),
    {
      field: 'extent',
      headerName: 'Size',
      unit: 'half light',
      width: 92,
      sortable: false,
      valueGetter: (_value, row) => describeExtent(row.target.extent),
    },
    computed(
      'luminosityDistanceMpc',
      'D_L',
      'Mpc',
      72,
      (t) => t.computed.luminosityDistanceMpc,
      { significant: 5 },
      true,
    ),
    computed('kpcPerArcsec', 'Scale', 'kpc/″', 64, (t) => t.computed.kpcPerArcsec, { decimals: 3 }),
    computed('ageGyr', 'Age', 'Gyr', 60, (t) => t.computed.ageGyr, { decimals: 3 }, true),
    computed('distanceModulusMag', 'μ', 'mag', 72, (t) => t.computed.distanceModulusMag, { decimals: 2 }),
    computed('dimming', 'Dimming', 'AB mag/″²', 80, (t) => t.computed.perFrequencyDimmingMag, { decimals: 2 }),
    computed(
      'requestedSeconds',
      'Time',
      'h',
      58,
      (t) => (t.requestedSeconds === null ? null : t.requestedSeconds / 3600),
      { decimals: 2 },
      true,
    ),
    {
      field: 'upSummary',
      headerName: 'Up',
      width: 92,
      sortable: false,
      computed: true,
      valueGetter: (_value, row) => row.target.computed.upSummary ?? '—',
    },
    {
      field: 'notices',
      headerName: 'Notices',
      width: 148,
      sortable: false,
      computed: true,
      valueGetter: (_value, row) => row.target.computed.notices.map((notice) => notice.message).join(' '),
      renderCell: ({ row: { target }, tabIndex }) => (
        <NoticesCell name={target.name} notices={target.computed.notices} tabIndex={tabIndex} />
      ),
    },
    typed('notes', { headerName: 'Notes', minWidth: 150, flex: 1 }),
    {
      field: 'menu',
      headerName: 'More',
      width: 52,
      sortable: false,
      renderHeader: () => <span style={visuallyHidden}>More</span>,
      renderCell: ({ row: { target }, tabIndex }) => (
        <IconButton
          size="small"
          tabIndex={tabIndex}
          aria-haspopup="menu"
          aria-label={`Actions for ${target.name}`}
          onClick={(event) => onMenu(target, event.currentTarget)}
        >
          <MoreVertIcon fontSize="small" />
        </IconButton>
      ),
    },
  ];
}

function coordinate(row: TargetRow, field: 'rightAscensionDeg' | 'declinationDeg' = 'rightAscensionDeg') {
  return (
    <Box component="span" sx={{ typography: 'figure', fontSize: '0.8125rem' }}>
      {row[field]}
    </Box>
  );
}

function Clipped({ text }: { text: string }) {
  return (
    <Box component="span" title={text} sx={{ overflow: 'hidden', textOverflow: 'ellipsis', whiteSpace: 'nowrap' }}>
      {text}
    </Box>
  );
}

function Quiet({ children }: { children: ReactNode }) {
  return (
    <Box component="span" sx={{ color: 'text.secondary', fontStyle: 'italic' }}>
      {children}
    </Box>
  );
}

/** What was typed, in its cell, with why it is not stored. */
function DraftText({ draft }: { draft: CellDraft }) {
  const text = draft.text === '' ? 'empty' : draft.text;
  if (draft.state === 'saving') return <span>{text}</span>;
  return (
    <Tooltip title={draft.message} describeChild enterDelay={200}>
      <Box component="span" sx={{ color: 'error.main', overflow: 'hidden', textOverflow: 'ellipsis' }}>
        <span aria-hidden="true">▲ </span>
        {text}
        <span style={visuallyHidden}>, not stored: {draft.message}</span>
      </Box>
    </Tooltip>
  );
}
