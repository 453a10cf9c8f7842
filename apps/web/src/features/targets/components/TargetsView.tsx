import type { CosmicTime, Target, TargetPage } from '@faintward/contracts/targets';
import ViewColumnIcon from '@mui/icons-material/ViewColumn';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Checkbox from '@mui/material/Checkbox';
import FormControlLabel from '@mui/material/FormControlLabel';
import Menu from '@mui/material/Menu';
import MenuItem from '@mui/material/MenuItem';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useCallback, useState } from 'react';
import type { z } from 'zod';
import { counted, formatNumber } from '../../../lib/format';
import type { TableParams } from '../../../lib/useTableParams';
import { ConfirmDialog } from '../../../ui/ConfirmDialog';
import { CosmicTimeStrip } from '../../../ui/CosmicTimeStrip';
import { EmptyState } from '../../../ui/EmptyState';
import { Note } from '../../../ui/Note';
import { useNotices } from '../../../ui/Notices';
import { Loaded, SkeletonBlock, type QueryState } from '../../../ui/PageStates';
import { Panel } from '../../../ui/Panel';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { LeaveGuard } from '../../../ui/form/LeaveGuard';
import { listTargetIds, targetsCsvUrl, useRemoveTargets } from '../api/targets';
import { useCellEdits } from '../hooks/useCellEdits';
import { useShownColumns } from '../hooks/useShownColumns';
import { AddTargetDialog } from './AddTargetDialog';
import { ImportDialog, type ImportDialogProps } from './ImportDialog';
import { bandField, shownBands } from './lightColumns';
import { TargetsGrid } from './TargetsGrid';

export interface TargetsViewProps {
  proposalId: string;
  page: QueryState<z.output<typeof TargetPage>>;
  cosmicTime: QueryState<CosmicTime>;
  params: TableParams;
  withNotices: boolean;
  onWithNotices: (withNotices: boolean) => void;
  canEdit: boolean;
  /** Why nothing can be changed. */
  readOnlyReason: string;
  onOpen: (targetId: string) => void;
}

const hideable = [
  ['rightAscensionDeg', 'Right ascension'],
  ['declinationDeg', 'Declination'],
  ['redshiftUncertainty', 'Uncertainty of the redshift'],
  ['brightnessText', 'Brightness as known'],
  ['apparentMagnitudeAb', 'Apparent magnitude'],
  ['lineFluxErgSCm2', 'Flux of its line'],
  ['lineObservedWavelengthNm', 'Where its line is observed'],
  ['surfaceBrightness', 'Surface brightness'],
  ...shownBands.map((band) => [bandField(band), `Magnitude in ${band}`] as const),
  ['extent', 'Size'],
  ['luminosityDistanceMpc', 'Luminosity distance'],
  ['kpcPerArcsec', 'Scale'],
  ['ageGyr', 'Age'],
  ['distanceModulusMag', 'Distance modulus'],
  ['dimming', 'Dimming'],
  ['requestedSeconds', 'Time asked'],
  ['upSummary', 'Up'],
  ['notices', 'Notices'],
  ['notes', 'Notes'],
] as const;
const hiddenAtFirst = ['extent', 'distanceModulusMag', ...shownBands.map(bandField)];
/** On a phone the redshift should not hide behind coordinates. */
const hiddenOnPhones = [...hiddenAtFirst, 'rightAscensionDeg', 'declinationDeg', 'redshiftUncertainty'];

/** The targets of a proposal: along cosmic time, and as a table that is typed into. */
export function TargetsView({
  proposalId,
  page,
  cosmicTime,
  params,
  withNotices,
  onWithNotices,
  canEdit,
  readOnlyReason,
  onOpen,
}: TargetsViewProps) {
  const edits = useCellEdits(proposalId);
  const remove = useRemoveTargets(proposalId);
  const announce = useNotices();
  const [shownColumns, setShownColumns] = useShownColumns(
    'faintward.targets.columns',
    window.matchMedia('(max-width: 599.95px)').matches ? hiddenOnPhones : hiddenAtFirst,
  );
  const [columnsAnchor, setColumnsAnchor] = useState<HTMLElement | null>(null);
  const [selected, setSelected] = useState<ReadonlySet<string>>(new Set());
  const [menu, setMenu] = useState<{ target: Target; anchor: HTMLElement }>();
  const [removing, setRemoving] = useState<{ ids: readonly string[]; name: string | undefined }>();
  const [isAdding, setIsAdding] = useState(false);
  const [isImporting, setIsImporting] = useState(false);
  const [pasted, setPasted] = useState<ImportDialogProps['pasted']>();
  const [selecting, setSelecting] = useState<{ error: unknown } | 'pending'>();

  const openMenu = useCallback((target: Target, anchor: HTMLElement) => setMenu({ target, anchor }), []);
  const isDialogOpen = isAdding || isImporting || removing !== undefined;
  const pasteBlock = useCallback((text: string) => {
    setPasted({ text });
    setIsImporting(true);
  }, []);

  const rowCount = page.data?.rowCount;
  const isFiltered = withNotices || params.search !== '';
  const selectAll = async () => {
    if (rowCount === undefined) return;
    const points = cosmicTime.data?.points;
    if (!isFiltered && points?.length === rowCount) {
      setSelected(new Set(points.map((point) => point.targetId)));
      return;
    }
    setSelecting('pending');
    try {
      const ids = await listTargetIds(proposalId, {
        ...(params.search ? { search: params.search } : {}),
        ...(withNotices ? { withNotices } : {}),
      });
      setSelected(new Set(ids));
      setSelecting(undefined);
    } catch (error) {
      setSelecting({ error });
    }
  };

  const actions = canEdit && (
    <>
      <Button onClick={() => setIsImporting(true)}>Import</Button>
      <Button variant="contained" onClick={() => setIsAdding(true)}>
        Add a target
      </Button>
    </>
  );
  const isEmpty = rowCount === 0 && !isFiltered;
  return (
    <Stack sx={{ gap: 2.25 }}>
      <LeaveGuard when={edits.hasUnsaved} what="Cells" />
      {!canEdit && <Note>{readOnlyReason}</Note>}
      {!isEmpty && (
        <Panel>
          <Loaded
            query={cosmicTime}
            what="The strip of cosmic time"
            skeleton={<SkeletonBlock label="The strip of cosmic time: loading" lines={4} />}
          >
            {(strip) => <CosmicTimeStrip {...strip} onChoose={onOpen} />}
          </Loaded>
        </Panel>
      )}
      <Box sx={{ minWidth: 0 }}>
        <TargetsGrid
          rows={page.data?.rows}
          rowCount={rowCount}
          params={params}
          error={page.error}
          isFetching={page.isFetching}
          onRetry={() => void page.refetch()}
          canEdit={canEdit}
          takesPaste={canEdit && !isDialogOpen}
          edits={edits}
          shownColumns={shownColumns}
          onShownColumnsChange={setShownColumns}
          selected={selected}
          onSelectedChange={setSelected}
          onOpen={onOpen}
          onMenu={openMenu}
          onPasteBlock={pasteBlock}
          isFiltered={isFiltered}
          toolbar={
            <>
              <FormControlLabel
                label="Only with notices"
                control={
                  <Checkbox size="small" checked={withNotices} onChange={(_event, checked) => onWithNotices(checked)} />
                }
              />
              <Button
                variant="text"
                startIcon={<ViewColumnIcon />}
                aria-haspopup="menu"
                onClick={(event) => setColumnsAnchor(event.currentTarget)}
              >
                Columns
              </Button>
              <Box sx={{ flex: 1 }} />
              {!isEmpty && (
                <Button variant="text" component="a" href={targetsCsvUrl(proposalId)} download>
                  Export CSV
                </Button>
              )}
              {actions}
            </>
          }
          empty={
            <EmptyState
              title="No targets yet"
              action={
                <Stack direction="row" sx={{ gap: 1.25, justifyContent: 'center' }}>
                  {actions}
                </Stack>
              }
            >
              {canEdit
                ? 'Copy rows from a spreadsheet and paste them anywhere on this page, import a file, or add one by hand.'
                : 'The team has not added any.'}
            </EmptyState>
          }
        />
        {selected.size > 0 && (
          <Selection
            count={selected.size}
            rowCount={rowCount ?? 0}
            isFiltered={isFiltered}
            pending={selecting === 'pending'}
            onAll={() => void selectAll()}
            onNone={() => setSelected(new Set())}
            onRemove={() => setRemoving({ ids: [...selected], name: undefined })}
          />
        )}
        {typeof selecting === 'object' && (
          <ProblemDisplay
            error={selecting.error}
            what="Not all targets could be selected"
            onRetry={() => void selectAll()}
          />
        )}
        {canEdit && !isEmpty && (
          <Typography variant="body2" color="textSecondary" sx={{ mt: 1 }}>
            Type into a cell, or press Enter or F2; Escape puts it back. Rows copied from a spreadsheet can be pasted
            anywhere on this page. Raised columns are computed.
          </Typography>
        )}
      </Box>

      <Menu anchorEl={columnsAnchor} open={columnsAnchor !== null} onClose={() => setColumnsAnchor(null)}>
        {hideable.map(([field, label]) => {
          const isShown = shownColumns[field] !== false;
          return (
            <MenuItem
              key={field}
              dense
              role="menuitemcheckbox"
              aria-checked={isShown}
              onClick={() => setShownColumns({ ...shownColumns, [field]: !isShown })}
            >
              <Checkbox size="small" checked={isShown} tabIndex={-1} disableRipple sx={{ p: 0, mr: 1 }} aria-hidden />
              {label}
            </MenuItem>
          );
        })}
      </Menu>
      <Menu anchorEl={menu?.anchor ?? null} open={menu !== undefined} onClose={() => setMenu(undefined)}>
        <MenuItem
          onClick={() => {
            if (menu) onOpen(menu.target.targetId);
            setMenu(undefined);
          }}
        >
          Open the target sheet
        </MenuItem>
        {canEdit && (
          <MenuItem
            onClick={() => {
              if (menu) setRemoving({ ids: [menu.target.targetId], name: menu.target.name });
              setMenu(undefined);
            }}
          >
            Remove
          </MenuItem>
        )}
      </Menu>
      <ConfirmDialog
        open={removing !== undefined}
        title={`Remove ${removing?.name ?? counted(removing?.ids.length ?? 0, 'target')}?`}
        confirmLabel={
          removing?.ids.length === 1 ? 'Remove the target' : `Remove ${counted(removing?.ids.length ?? 0, 'target')}`
        }
        destructive
        pending={remove.isPending}
        error={remove.error}
        onCancel={() => {
          setRemoving(undefined);
          remove.reset();
        }}
        onConfirm={() => {
          if (!removing) return;
          remove.mutate(removing.ids, {
            onSuccess: ({ removedCount }) => {
              setSelected((old) => new Set([...old].filter((id) => !removing.ids.includes(id))));
              setRemoving(undefined);
              announce(`${counted(removedCount, 'target')} removed.`);
            },
          });
        }}
      >
        Their observations go with them. The history keeps their names.
      </ConfirmDialog>
      <AddTargetDialog
        proposalId={proposalId}
        open={isAdding}
        onClose={() => setIsAdding(false)}
        onAdded={() => setIsAdding(false)}
      />
      {canEdit && (
        <ImportDialog
          proposalId={proposalId}
          open={isImporting}
          pasted={pasted}
          onClose={() => setIsImporting(false)}
          onImported={(result) => {
            setIsImporting(false);
            announce(
              [
                `${counted(result.importedCount, 'target')} imported`,
                result.skippedFaultyCount > 0 && `${counted(result.skippedFaultyCount, 'faulty row')} left out`,
                result.skippedDuplicateCount > 0 && `${result.skippedDuplicateCount} already in the list`,
              ]
                .filter(Boolean)
                .join(', ') + '.',
            );
          }}
        />
      )}
    </Stack>
  );
}

/** What is selected, beyond this page too, and said so. */
function Selection({
  count,
  rowCount,
  isFiltered,
  pending,
  onAll,
  onNone,
  onRemove,
}: {
  count: number;
  rowCount: number;
  isFiltered: boolean;
  pending: boolean;
  onAll: () => void;
  onNone: () => void;
  onRemove: () => void;
}) {
  return (
    <Stack
      direction="row"
      role="status"
      sx={{ gap: 1.5, alignItems: 'center', flexWrap: 'wrap', bgcolor: 'faintward.raised', px: 1.75, py: 0.75, mt: 1 }}
    >
      <Typography variant="body2" sx={{ flex: '1 1 200px' }}>
        {counted(count, 'target')} selected, those on other pages included.
      </Typography>
      {count < rowCount && (
        <Button size="small" variant="text" loading={pending} onClick={onAll}>
          Select all {formatNumber(rowCount, { decimals: 0 })} {isFiltered ? 'that match' : 'of the proposal'}
        </Button>
      )}
      <Button size="small" variant="text" onClick={onNone}>
        Select none
      </Button>
      <Button size="small" color="error" onClick={onRemove}>
        Remove {formatNumber(count, { decimals: 0 })}
      </Button>
    </Stack>
  );
}
