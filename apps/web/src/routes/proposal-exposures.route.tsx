import { Id } from '@faintward/contracts/common';
import { ObservationListQuery } from '@faintward/contracts/observations';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import { useQuery } from '@tanstack/react-query';
import { useCallback, useMemo, useState } from 'react';
import { Link as RouterLink, useSearchParams } from 'react-router-dom';
import { paths } from '../app/paths';
import { observationQueries } from '../features/observations/api/observations';
import { ApplySetupPanel } from '../features/observations/components/ApplySetupPanel';
import { ObservationsView } from '../features/observations/components/ObservationsView';
import { useProposal } from '../features/proposals/components/useProposal';
import { targetQueries } from '../features/targets/api/targets';
import { facilityQueries } from '../lib/queries/facilities';
import { useDebounced } from '../lib/useDebounced';
import { useTableParams } from '../lib/useTableParams';
import { EmptyState } from '../ui/EmptyState';
import { Note } from '../ui/Note';
import { Loaded } from '../ui/PageStates';

const pageSize = 100;

/** What each target takes: setups applied, exposures, overheads, what limits them. */
export function Component() {
  const { proposalId, abilities, state, cosmology } = useProposal();
  const [address, setAddress] = useSearchParams();
  const table = useTableParams();
  const params = useMemo(
    () => ({
      ...table,
      ...(address.has('pageSize') ? {} : { pageSize }),
      sort: ObservationListQuery.shape.sort.safeParse(table.sort ?? 'position').data,
    }),
    [table, address],
  );
  const openId = Id.safeParse(address.get('observation')).data;
  const open = useCallback(
    (id: string | undefined) =>
      setAddress(
        (old) => {
          const next = new URLSearchParams(old);
          if (id === undefined) next.delete('observation');
          else next.set('observation', id);
          return next;
        },
        { replace: true },
      ),
    [setAddress],
  );
  const [isApplying, setIsApplying] = useState(false);
  const [targetSearch, setTargetSearch] = useState('');
  const settledSearch = useDebounced(targetSearch, 300);

  const page = useQuery(
    observationQueries.list(proposalId, {
      page: params.page,
      pageSize: params.pageSize,
      order: params.order,
      ...(params.sort ? { sort: params.sort } : {}),
      ...(params.search ? { search: params.search } : {}),
    }),
  );
  const telescopes = useQuery(facilityQueries.telescopes());
  // The first without a search, for the number of targets in all and for an example.
  const allTargets = useQuery(targetQueries.list(proposalId, { page: 1, pageSize }));
  const foundTargets = useQuery({
    ...targetQueries.list(proposalId, { page: 1, pageSize, search: settledSearch }),
    enabled: settledSearch !== '',
  });

  const canEdit = abilities.canEditTargets;
  const isNothingYet = page.data?.rowCount === 0 && params.search === '';
  const hasNoTargets = allTargets.data?.rowCount === 0;
  const showsApply = canEdit && !hasNoTargets && (isApplying || isNothingYet);
  return (
    <Stack sx={{ gap: 2.25 }}>
      {!canEdit && (
        <Note>
          {state === 'draft' || state === 'submitted'
            ? 'You may read these exposures. The principal investigator can let you edit them, under Team.'
            : 'The deadline has passed: exposures can be read and no longer changed.'}
        </Note>
      )}
      {showsApply && (
        <Loaded query={telescopes} what="The instruments">
          {(list) => (
            <Loaded query={allTargets} what="The targets">
              {(targets) => (
                <ApplySetupPanel
                  proposalId={proposalId}
                  cosmology={cosmology}
                  telescopes={list.rows}
                  targets={settledSearch === '' ? targets.rows : (foundTargets.data?.rows ?? [])}
                  targetCount={targets.rowCount}
                  like={page.data?.rows[0]}
                  onSearchTargets={setTargetSearch}
                  isSearching={foundTargets.isFetching || targetSearch !== settledSearch}
                  onApplied={() => setIsApplying(true)}
                />
              )}
            </Loaded>
          )}
        </Loaded>
      )}
      <Box sx={{ minWidth: 0 }}>
        <ObservationsView
          proposalId={proposalId}
          page={page}
          params={params}
          telescopes={telescopes.data?.rows ?? []}
          openId={openId}
          onOpen={open}
          canEdit={canEdit}
          applyAction={
            canEdit && !isNothingYet ? (
              <Button
                variant={isApplying ? 'outlined' : 'contained'}
                aria-expanded={isApplying}
                onClick={() => setIsApplying(!isApplying)}
              >
                {isApplying ? 'Put the form away' : 'Apply a setup'}
              </Button>
            ) : null
          }
          empty={
            <EmptyState
              title={hasNoTargets ? 'No targets to observe yet' : 'No observations yet'}
              action={
                hasNoTargets && (
                  <Button component={RouterLink} to={paths.proposalSection.to(proposalId, 'targets')}>
                    To the targets
                  </Button>
                )
              }
            >
              {hasNoTargets
                ? 'Exposures are planned for targets.'
                : canEdit
                  ? 'Apply a setup above: it answers while you type, and plans all targets at once.'
                  : 'The team has not planned any.'}
            </EmptyState>
          }
        />
      </Box>
    </Stack>
  );
}
