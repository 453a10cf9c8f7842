import type { Target } from '@faintward/contracts/targets';
import { useGridApiRef, type GridRowId } from '@mui/x-data-grid';
import { useCallback, useEffect, useMemo, useRef, useState, type ReactNode } from 'react';
import type { TableParams } from '../../../lib/useTableParams';
import { ChangedMeanwhileDialog } from '../../../ui/ChangedMeanwhileDialog';
import { DataTable } from '../../../ui/DataTable';
import { cellOfField, cellWords, isEditableField, storedText, type CellName, type EditableField } from '../cells';
import type { CellEdits } from '../hooks/useCellEdits';
import { CellFaults } from './CellFaults';
import { targetColumns, toTargetRow, type TargetRow } from './targetColumns';

export interface TargetsGridProps {
  rows: readonly Target[] | undefined;
  rowCount: number | undefined;
  params: TableParams;
  error: unknown;
  isFetching: boolean;
  onRetry: () => void;
  canEdit: boolean;
  /** False while a dialog is open, which has its own use for what is pasted. */
  takesPaste: boolean;
  edits: CellEdits;
  shownColumns: Record<string, boolean>;
  onShownColumnsChange: (model: Record<string, boolean>) => void;
  selected: ReadonlySet<string>;
  onSelectedChange: (selected: ReadonlySet<string>) => void;
  onOpen: (targetId: string) => void;
  onMenu: (target: Target, anchor: HTMLElement) => void;
  /** A block copied from a spreadsheet was pasted into the table. */
  onPasteBlock: (text: string) => void;
  isFiltered: boolean;
  toolbar: ReactNode;
  empty: ReactNode;
}

/** Rows and columns, not one value. */
function isBlock(text: string): boolean {
  return /[\t\n\r]/.test(text.trim());
}

/** The targets as a table that is typed into; what the server refuses stays in its cell. */
export function TargetsGrid({
  rows,
  rowCount,
  params,
  error,
  isFetching,
  onRetry,
  canEdit,
  takesPaste,
  edits,
  shownColumns,
  onShownColumnsChange,
  selected,
  onSelectedChange,
  onOpen,
  onMenu,
  onPasteBlock,
  isFiltered,
  toolbar,
  empty,
}: TargetsGridProps) {
  const apiRef = useGridApiRef();
  const openedVersions = useRef(new Map<string, number>());
  // The dialog opens by itself for a new conflict; "Decide later" closes it and leaves the line under the table.
  const [postponed, setPostponed] = useState<ReadonlySet<string>>(new Set());
  const columns = useMemo(() => targetColumns({ canEdit, onOpen, onMenu }), [canEdit, onOpen, onMenu]);
  const gridRows = useMemo(() => rows?.map((target) => toTargetRow(target, edits.drafts)), [rows, edits.drafts]);
  const { commit } = edits;

  const processRowUpdate = useCallback(
    (next: TargetRow, old: TargetRow) => {
      for (const [field, cell] of Object.entries(cellOfField) as [EditableField, CellName][]) {
        if (next[field] === old[field]) continue;
        commit(next.target, cell, next[field], openedVersions.current.get(`${next.target.targetId} ${field}`));
      }
      return next;
    },
    [commit],
  );

  useEffect(() => {
    if (!takesPaste) return;
    const paste = (event: ClipboardEvent) => {
      const target = event.target instanceof Element ? event.target : undefined;
      const inGrid = target?.closest('[role="grid"]') != null;
      if (!inGrid && target?.closest('input, textarea, [contenteditable], [role="dialog"]')) return;
      const text = event.clipboardData?.getData('text/plain') ?? '';
      if (!isBlock(text)) return;
      event.preventDefault();
      const cell = target?.closest('[role="gridcell"]');
      const id = cell?.parentElement?.getAttribute('data-id');
      const field = cell?.getAttribute('data-field');
      if (id && field && apiRef.current?.getCellMode(id, field) === 'edit') {
        apiRef.current.stopCellEditMode({ id, field, ignoreModifications: true });
      }
      onPasteBlock(text);
    };
    document.addEventListener('paste', paste);
    return () => document.removeEventListener('paste', paste);
  }, [takesPaste, apiRef, onPasteBlock]);

  const conflict = [...edits.drafts].find(([key, draft]) => draft.current !== undefined && !postponed.has(key));
  const goTo = (targetId: string, cell: CellName) => {
    const field = Object.entries(cellOfField).find(([, name]) => name === cell)?.[0];
    const index = rows?.findIndex((row) => row.targetId === targetId) ?? -1;
    if (!field || index < 0) return undefined;
    return () => {
      const colIndex = apiRef.current?.getColumnIndex(field) ?? 0;
      apiRef.current?.scrollToIndexes({ rowIndex: index, colIndex });
      apiRef.current?.setCellFocus(targetId, field);
    };
  };
  const isLong = (rows?.length ?? 0) > 14;
  return (
    <>
      <DataTable<TargetRow>
        label="Targets"
        what="targets"
        columns={columns}
        rows={gridRows}
        rowCount={rowCount}
        getRowId={targetIdOf}
        params={params}
        error={error}
        isFetching={isFetching}
        onRetry={onRetry}
        searchLabel="Search names and notes"
        isFiltered={isFiltered}
        toolbar={toolbar}
        empty={empty}
        {...(isLong ? { height: 'clamp(420px, calc(100dvh - 230px), 1100px)' } : {})}
        grid={{
          apiRef,
          processRowUpdate,
          getRowClassName: ({ row }) => (row.isSaving ? 'saving-row' : ''),
          columnVisibilityModel: shownColumns,
          onColumnVisibilityModelChange: onShownColumnsChange,
          onCellEditStart: ({ id, field, row }) => openedVersions.current.set(`${id} ${field}`, row.target.version),
          onCellKeyDown: ({ id, field, cellMode, isEditable }, event) => {
            if (event.key !== 'F2' || cellMode === 'edit' || !isEditable || !isEditableField(field)) return;
            event.preventDefault();
            const row = rows?.find((target) => target.targetId === id);
            if (row) openedVersions.current.set(`${id} ${field}`, row.version);
            apiRef.current?.startCellEditMode({ id, field });
          },
          checkboxSelection: canEdit,
          disableRowSelectionExcludeModel: true,
          keepNonExistentRowsSelected: true,
          rowSelectionModel: { type: 'include', ids: selected as Set<GridRowId> },
          onRowSelectionModelChange: ({ ids }) => onSelectedChange(new Set([...ids].map(String))),
          hideFooterSelectedRowCount: true,
          sx: gridStyle,
        }}
      />
      <CellFaults
        edits={edits}
        onGoTo={(draft) => goTo(draft.targetId, draft.cell)}
        onCompare={(key) => setPostponed((old) => new Set([...old].filter((one) => one !== key)))}
      />
      {conflict && (
        <ChangedMeanwhileDialog
          open
          what={conflict[1].targetName}
          rows={conflictRows(conflict[1])}
          note={
            storedText(conflict[1].current!, conflict[1].cell) === conflict[1].before
              ? 'The cell that you typed into was not touched by them: storing yours keeps both changes.'
              : undefined
          }
          onMine={() => edits.resolve(conflict[0], 'mine')}
          onTheirs={() => edits.resolve(conflict[0], 'theirs')}
          onLater={() => setPostponed((old) => new Set(old).add(conflict[0]))}
        />
      )}
    </>
  );

  /** The cell itself, and whatever else of the row looks different from what is on this page. */
  function conflictRows(draft: NonNullable<typeof conflict>[1]) {
    const current = draft.current!;
    const seen = rows?.find((row) => row.targetId === draft.targetId);
    const others = (Object.values(cellOfField) as CellName[]).filter(
      (cell) => cell !== draft.cell && seen && storedText(seen, cell) !== storedText(current, cell),
    );
    const shown = (text: string) => (text === '' ? <em>empty</em> : text);
    return [
      { label: cellWords[draft.cell], mine: shown(draft.text), theirs: shown(storedText(current, draft.cell)) },
      ...others.map((cell) => ({
        label: cellWords[cell],
        mine: 'not typed',
        theirs: shown(storedText(current, cell)),
      })),
    ];
  }
}

function targetIdOf(row: TargetRow): string {
  return row.target.targetId;
}

const gridStyle = {
  '& .faulty': { boxShadow: 'inset 0 0 0 1.5px var(--fw-palette-error-main)' },
  '& .saving': { fontStyle: 'italic', color: 'text.secondary' },
  '& .saving-row .computed': { color: 'text.secondary', fontStyle: 'italic' },
  '& .MuiDataGrid-cell--editing': { bgcolor: 'background.paper' },
} as const;
