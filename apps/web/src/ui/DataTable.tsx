import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import InputAdornment from '@mui/material/InputAdornment';
import Stack from '@mui/material/Stack';
import TextField from '@mui/material/TextField';
import SearchIcon from '@mui/icons-material/Search';
import {
  DataGrid,
  type DataGridProps,
  type GridColDef,
  type GridRowId,
  type GridSortModel,
  type GridValidRowModel,
} from '@mui/x-data-grid';
import { useEffect, useMemo, useState, type ReactNode } from 'react';
import type { TableParams } from '../lib/useTableParams';
import { EmptyState } from './EmptyState';
import { MathSymbol } from './MathSymbol';
import { Note } from './Note';
import { ProblemDisplay } from './ProblemDisplay';

export type TableColumn<Row extends GridValidRowModel> = GridColDef<Row> & {
  /** Second line of the header. */
  unit?: string;
  /** Computed by the server: on raised ground, never editable. */
  computed?: boolean;
  /** Right-aligned, tabular. */
  numeric?: boolean;
};

export interface DataTableProps<Row extends GridValidRowModel> {
  /** Name of the table, for screen readers. */
  label: string;
  /** Outside the component or memoised: the grid forgets widths when columns change identity. */
  columns: readonly TableColumn<Row>[];
  /** Undefined while pending or failed. */
  rows: readonly Row[] | undefined;
  getRowId: (row: Row) => GridRowId;
  /** With `params` the server pages, sorts and searches, and `rowCount` counts what matches in all. */
  rowCount?: number | undefined;
  params?: TableParams | undefined;
  error?: unknown;
  isFetching?: boolean;
  onRetry?: () => void;
  /** What the rows are, in the plural: "people". */
  what: string;
  /** Shown when there is nothing at all. */
  empty: ReactNode;
  /** True when filters or a search hide rows; then "no match" and a way to clear them stand in place of `empty`. */
  isFiltered?: boolean;
  onClearFilters?: () => void;
  /** A search field above the table (needs `params`). */
  searchLabel?: string;
  /** Filters, buttons. */
  toolbar?: ReactNode;
  /** Pixels or a CSS length; without it the table is as high as its rows. */
  height?: number | string;
  /** Anything else of the grid: editing, selection, row clicks. */
  grid?: Partial<DataGridProps<Row>>;
}

const pageSizes = [25, 50, 100];

/** A table with all its states. Paging, sorting and searching by the server when `params` is given, else in place. */
export function DataTable<Row extends GridValidRowModel>({
  label,
  columns,
  rows,
  getRowId,
  rowCount,
  params,
  error,
  isFetching = false,
  onRetry,
  what,
  empty,
  isFiltered = false,
  onClearFilters,
  searchLabel,
  toolbar,
  height,
  grid,
}: DataTableProps<Row>) {
  const gridColumns = useMemo(() => columns.map(toGridColumn), [columns]);
  const isPending = rows === undefined && !error;
  const noMatch = isFiltered || Boolean(params?.search);
  const clear = () => {
    params?.clear();
    onClearFilters?.();
  };

  let body: ReactNode;
  if (rows === undefined && error) {
    body = (
      <Box sx={{ p: 2 }}>
        <ProblemDisplay error={error} what={`The ${what} could not be loaded`} {...(onRetry ? { onRetry } : {})} />
      </Box>
    );
  } else if (rows?.length === 0 && !isFetching && (rowCount ?? 0) === 0) {
    body = noMatch ? (
      <EmptyState
        title={`None of the ${what} matches these filters`}
        action={<Button onClick={clear}>Clear filters</Button>}
      />
    ) : (
      empty
    );
  } else {
    body = (
      <Box
        aria-busy={isPending || isFetching}
        sx={{ display: 'flex', flexDirection: 'column', height: isPending ? (height ?? 340) : height, minWidth: 0 }}
      >
        <DataGrid<Row>
          aria-label={label}
          columns={gridColumns}
          rows={rows ?? []}
          getRowId={getRowId}
          loading={isPending || isFetching}
          rowHeight={38}
          columnHeaderHeight={48}
          disableRowSelectionOnClick
          disableColumnMenu
          slotProps={{
            loadingOverlay: { variant: rows?.length ? 'linear-progress' : 'skeleton', noRowsVariant: 'skeleton' },
          }}
          {...(params
            ? {
                paginationMode: 'server' as const,
                sortingMode: 'server' as const,
                filterMode: 'server' as const,
                rowCount: rowCount ?? 0,
                paginationModel: { page: params.page - 1, pageSize: params.pageSize },
                onPaginationModelChange: (model: { page: number; pageSize: number }) =>
                  params.change({ page: model.page + 1, pageSize: model.pageSize }),
                sortModel: toSortModel(params),
                onSortModelChange: (model: GridSortModel) =>
                  params.change({ sort: model[0]?.field, order: model[0]?.sort ?? 'asc', page: 1 }),
              }
            : {})}
          pageSizeOptions={pageSizes}
          hideFooter={!params && (rows?.length ?? 0) <= 100}
          {...grid}
          sx={[tableStyle, ...(Array.isArray(grid?.sx) ? grid.sx : grid?.sx ? [grid.sx] : [])]}
        />
      </Box>
    );
  }

  return (
    <Box sx={{ minWidth: 0 }}>
      {(searchLabel || toolbar) && (
        <Stack direction="row" sx={{ gap: 1.25, mb: 1.25, flexWrap: 'wrap', alignItems: 'center' }}>
          {searchLabel && params && <SearchField label={searchLabel} params={params} />}
          {toolbar}
        </Stack>
      )}
      {rows !== undefined && Boolean(error) && (
        <Box sx={{ mb: 1.25 }}>
          <Note
            tone="warning"
            live
            action={
              onRetry && (
                <Button size="small" onClick={onRetry}>
                  Retry
                </Button>
              )
            }
          >
            The {what} could not be refreshed: these rows may be out of date.
          </Note>
        </Box>
      )}
      <Box
        sx={{
          bgcolor: 'background.paper',
          border: 1,
          borderColor: 'divider',
          borderRadius: '6px',
          overflow: 'hidden',
          minWidth: 0,
        }}
      >
        {body}
      </Box>
    </Box>
  );
}

function toSortModel(params: TableParams): GridSortModel {
  return params.sort ? [{ field: params.sort, sort: params.order }] : [];
}

function toGridColumn<Row extends GridValidRowModel>(column: TableColumn<Row>): GridColDef<Row> {
  const { unit, computed, numeric, ...rest } = column;
  const align = numeric ? ('right' as const) : (rest.align ?? ('left' as const));
  return {
    ...rest,
    // Drawn cells are centred as the written ones are.
    ...(rest.renderCell ? { display: 'flex' as const } : {}),
    align,
    headerAlign: align,
    ...(computed ? { editable: false } : {}),
    cellClassName: computed ? 'computed' : (rest.cellClassName ?? ''),
    headerClassName: computed ? 'computed' : (rest.headerClassName ?? ''),
    headerName: unit ? `${rest.headerName ?? rest.field} (${unit})` : (rest.headerName ?? rest.field),
    renderHeader:
      rest.renderHeader ??
      (() => (
        <Box component="span" sx={{ lineHeight: 1.25, display: 'block', whiteSpace: 'nowrap', textAlign: align }}>
          <MathSymbol text={rest.headerName ?? rest.field} />
          {unit && (
            <Box component="small" sx={{ display: 'block', fontWeight: 400, fontSize: '0.75rem' }}>
              {unit}
            </Box>
          )}
        </Box>
      )),
  };
}

const tableStyle = {
  border: 0,
  flex: 1,
  fontSize: '0.875rem',
  fontVariantNumeric: 'tabular-nums lining-nums',
  '--DataGrid-overlayHeight': '160px',
  '--DataGrid-rowBorderColor': 'var(--fw-palette-divider)',
  '--rowBorderColor': 'var(--fw-palette-divider)',
  '& .MuiDataGrid-columnHeaderTitleContainer': { color: 'text.secondary' },
  '& .MuiDataGrid-columnHeader': { fontSize: '0.8125rem', fontWeight: 600 },
  '& .MuiDataGrid-columnSeparator': { opacity: 0, transition: 'none' },
  '& .MuiDataGrid-columnHeaders:hover .MuiDataGrid-columnSeparator': { opacity: 1 },
  '& .computed': { bgcolor: 'faintward.raised' },
  '& .MuiDataGrid-cell:focus, & .MuiDataGrid-cell:focus-within, & .MuiDataGrid-columnHeader:focus, & .MuiDataGrid-columnHeader:focus-within':
    { outline: '2px solid var(--fw-palette-faintward-accent)', outlineOffset: '-2px' },
  '& .MuiDataGrid-row:hover': { bgcolor: 'action.hover' },
} as const;

/** Searches 300 ms after the last key, so that each letter is not a request. */
function SearchField({ label, params }: { label: string; params: TableParams }) {
  const [text, setText] = useState(params.search);
  const { search, change } = params;
  useEffect(() => {
    if (text === search) return;
    const timer = setTimeout(() => change({ search: text, page: 1 }), 300);
    return () => clearTimeout(timer);
  }, [text, search, change]);
  const [lastSearch, setLastSearch] = useState(search);
  if (search !== lastSearch) {
    // Cleared or navigated from outside: the field follows.
    setLastSearch(search);
    setText(search);
  }
  return (
    <TextField
      type="search"
      label={label}
      value={text}
      onChange={(event) => setText(event.target.value)}
      sx={{ width: { xs: '100%', sm: 280 } }}
      slotProps={{
        input: {
          startAdornment: (
            <InputAdornment position="start">
              <SearchIcon fontSize="small" />
            </InputAdornment>
          ),
        },
      }}
    />
  );
}
