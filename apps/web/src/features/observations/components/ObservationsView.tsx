import type { Telescope } from '@faintward/contracts/facilities';
import type { Observation, ObservationPage } from '@faintward/contracts/observations';
import type { GridRowId } from '@mui/x-data-grid';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Drawer from '@mui/material/Drawer';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import useMediaQuery from '@mui/material/useMediaQuery';
import { useState, type ReactNode } from 'react';
import type { z } from 'zod';
import { counted, formatNumber } from '../../../lib/format';
import type { TableParams } from '../../../lib/useTableParams';
import { ConfirmDialog } from '../../../ui/ConfirmDialog';
import { DataTable } from '../../../ui/DataTable';
import { Note } from '../../../ui/Note';
import { useNotices } from '../../../ui/Notices';
import type { QueryState } from '../../../ui/PageStates';
import { useObservationMutations } from '../api/observations';
import { observationColumns, observationRowHeight } from './observationColumns';
import { ObservationPanel } from './ObservationPanel';

export interface ObservationsViewProps {
  proposalId: string;
  page: QueryState<z.output<typeof ObservationPage>>;
  params: TableParams;
  telescopes: readonly Telescope[];
  openId: string | undefined;
  onOpen: (observationId: string | undefined) => void;
  canEdit: boolean;
  /** Opens the panel that applies a setup; undefined when it is open or not allowed. */
  applyAction: ReactNode;
  empty: ReactNode;
}

const idOf = (row: Observation) => row.observationId;

/** All observations as a table, and the chosen one beside it (over it on narrow screens). */
export function ObservationsView({
  proposalId,
  page,
  params,
  telescopes,
  openId,
  onOpen,
  canEdit,
  applyAction,
  empty,
}: ObservationsViewProps) {
  const isWide = useMediaQuery('(min-width: 1200px)');
  const { remove } = useObservationMutations(proposalId);
  const announce = useNotices();
  const [selected, setSelected] = useState<ReadonlySet<string>>(new Set());
  const [isRemoving, setIsRemoving] = useState(false);
  const rows = page.data?.rows;
  const open = rows?.find((row) => row.observationId === openId);
  const isLong = (rows?.length ?? 0) > 14;
  const panel = open && (
    <ObservationPanel
      key={open.observationId}
      proposalId={proposalId}
      observation={open}
      telescopes={telescopes}
      canEdit={canEdit}
      onClose={() => onOpen(undefined)}
    />
  );
  return (
    <Box
      sx={{
        display: 'grid',
        gap: 3,
        gridTemplateColumns: open && isWide ? 'minmax(0, 1fr) minmax(0, 560px)' : 'minmax(0, 1fr)',
        alignItems: 'start',
      }}
    >
      <Box sx={{ minWidth: 0, ...(open && isWide ? { position: 'sticky', top: 16 } : {}) }}>
        {openId !== undefined && rows && !open && (
          <Box sx={{ mb: 1.25 }}>
            <Note
              action={
                <Button size="small" onClick={() => onOpen(undefined)}>
                  Close
                </Button>
              }
            >
              The observation in this address is not on this page of the table, or has been removed.
            </Note>
          </Box>
        )}
        <DataTable<Observation>
          label="Observations"
          what="observations"
          columns={observationColumns}
          rows={rows}
          rowCount={page.data?.rowCount}
          getRowId={idOf}
          params={params}
          error={page.error}
          isFetching={page.isFetching}
          onRetry={() => void page.refetch()}
          searchLabel="Search targets and setups"
          toolbar={
            <>
              <Box sx={{ flex: 1 }} />
              {applyAction}
            </>
          }
          empty={empty}
          {...(isLong ? { height: 'clamp(420px, calc(100dvh - 200px), 1100px)' } : {})}
          grid={{
            checkboxSelection: canEdit,
            disableRowSelectionExcludeModel: true,
            keepNonExistentRowsSelected: true,
            rowSelectionModel: { type: 'include', ids: selected as Set<GridRowId> },
            onRowSelectionModelChange: ({ ids }) => setSelected(new Set([...ids].map(String))),
            getRowHeight: ({ model }) => observationRowHeight(model as Observation),
            hideFooterSelectedRowCount: true,
            onRowClick: ({ id }) => onOpen(String(id)),
            onCellKeyDown: ({ id, field }, event) => {
              if (event.key !== 'Enter' || field === '__check__') return;
              event.preventDefault();
              onOpen(String(id));
            },
            getRowClassName: ({ id }) => (id === openId ? 'open-row' : ''),
            sx: {
              '& .MuiDataGrid-row': { cursor: 'pointer' },
              '& .open-row': {
                boxShadow: 'inset 3px 0 0 var(--fw-palette-faintward-accent)',
                bgcolor: 'action.selected',
              },
            },
          }}
        />
        {selected.size > 0 && (
          <Stack
            direction="row"
            role="status"
            sx={{
              gap: 1.5,
              alignItems: 'center',
              flexWrap: 'wrap',
              bgcolor: 'faintward.raised',
              px: 1.75,
              py: 0.75,
              mt: 1,
            }}
          >
            <Typography variant="body2" sx={{ flex: '1 1 200px' }}>
              {counted(selected.size, 'observation')} selected, those on other pages included.
            </Typography>
            <Button size="small" variant="text" onClick={() => setSelected(new Set())}>
              Select none
            </Button>
            <Button size="small" color="error" onClick={() => setIsRemoving(true)}>
              Remove {formatNumber(selected.size, { decimals: 0 })}
            </Button>
          </Stack>
        )}
        {rows && rows.length > 0 && (
          <Typography variant="body2" color="textSecondary" sx={{ mt: 1 }}>
            Exposure times are planning figures, to be confirmed by the observatory’s instrument team. Click a row, or
            press Enter on it, for its light budget and overheads.
          </Typography>
        )}
      </Box>
      {isWide ? (
        <Box
          component="aside"
          aria-label="The chosen observation"
          sx={{ minWidth: 0, display: open ? 'block' : 'none' }}
        >
          {panel}
        </Box>
      ) : (
        <Drawer
          anchor="right"
          open={open !== undefined}
          onClose={() => onOpen(undefined)}
          slotProps={{
            paper: {
              role: 'dialog',
              'aria-modal': true,
              'aria-label': 'The chosen observation',
              sx: {
                width: { xs: '100%', sm: 600 },
                backgroundImage: 'none',
                bgcolor: 'background.default',
                px: { xs: 2, sm: 3 },
                py: 2,
              },
            },
          }}
        >
          {panel}
        </Drawer>
      )}
      <ConfirmDialog
        open={isRemoving}
        title={`Remove ${counted(selected.size, 'observation')}?`}
        confirmLabel={`Remove ${counted(selected.size, 'observation')}`}
        destructive
        pending={remove.isPending}
        error={remove.error}
        onCancel={() => {
          setIsRemoving(false);
          remove.reset();
        }}
        onConfirm={() =>
          remove.mutate([...selected], {
            onSuccess: ({ removedCount }) => {
              setSelected(new Set());
              setIsRemoving(false);
              announce(`${counted(removedCount, 'observation')} removed.`);
            },
          })
        }
      >
        The targets stay; the hours that these observations ask for are taken off the request.
      </ConfirmDialog>
    </Box>
  );
}
