import { Id } from '@faintward/contracts/common';
import { TargetSort } from '@faintward/contracts/targets';
import { useQuery } from '@tanstack/react-query';
import { useCallback, useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';
import { observationQueries } from '../features/observations/api/observations';
import { TargetObservations } from '../features/observations/components/TargetObservations';
import { useProposal } from '../features/proposals/components/useProposal';
import { distancesBeside, targetQueries } from '../features/targets/api/targets';
import { TargetSheet } from '../features/targets/components/TargetSheet';
import { TargetsView } from '../features/targets/components/TargetsView';
import { useTableParams } from '../lib/useTableParams';
import { Loaded } from '../ui/PageStates';

/** The longest page that the table shows at once; there may be thousands of rows. */
const pageSize = 100;

/** The targets, and the sheet of the one that the address names. */
export function Component() {
  const { proposalId, abilities, state } = useProposal();
  const [address, setAddress] = useSearchParams();
  const table = useTableParams();
  const withNotices = address.get('notices') === '1';
  const targetId = Id.safeParse(address.get('target')).data;
  // In one step: the address does not queue two.
  const change = useCallback(
    (values: Record<string, string | undefined>, replace: boolean) =>
      setAddress(
        (old) => {
          const next = new URLSearchParams(old);
          for (const [name, value] of Object.entries(values)) {
            if (value === undefined) next.delete(name);
            else next.set(name, value);
          }
          return next;
        },
        { replace },
      ),
    [setAddress],
  );
  const params = useMemo(
    () => ({
      ...table,
      ...(address.has('pageSize') ? {} : { pageSize }),
      sort: TargetSort.safeParse(table.sort).data,
      clear: () => change({ search: undefined, notices: undefined, page: undefined }, true),
    }),
    [table, address, change],
  );
  const open = useCallback((id: string) => change({ target: id }, false), [change]);

  const page = useQuery(
    targetQueries.list(proposalId, {
      page: params.page,
      pageSize: params.pageSize,
      order: params.order,
      ...(params.sort ? { sort: params.sort } : {}),
      ...(params.search ? { search: params.search } : {}),
      ...(withNotices ? { withNotices } : {}),
    }),
  );
  const cosmicTime = useQuery(targetQueries.cosmicTime(proposalId));
  const target = useQuery({ ...targetQueries.one(proposalId, targetId ?? ''), enabled: targetId !== undefined });
  const beside = useQuery({
    ...distancesBeside('conv70', target.data?.redshift ?? 0),
    enabled: target.data !== undefined,
  });
  const observations = useQuery({
    ...observationQueries.list(proposalId, { targetId: targetId ?? '', pageSize }),
    enabled: targetId !== undefined,
  });
  return (
    <>
      <TargetsView
        proposalId={proposalId}
        page={page}
        cosmicTime={cosmicTime}
        params={params}
        withNotices={withNotices}
        onWithNotices={(checked) => change({ notices: checked ? '1' : undefined, page: undefined }, true)}
        canEdit={abilities.canEditTargets}
        readOnlyReason={
          state === 'draft' || state === 'submitted'
            ? 'You may read these targets. The principal investigator can let you edit them, under Team.'
            : 'The deadline has passed: targets can be read and no longer changed.'
        }
        onOpen={open}
      />
      <TargetSheet
        proposalId={proposalId}
        targetId={targetId}
        query={target}
        beside={beside}
        canEdit={abilities.canEditTargets}
        observations={
          <Loaded query={observations} what="Its observations">
            {(list) => <TargetObservations proposalId={proposalId} observations={list.rows} />}
          </Loaded>
        }
        onClose={() => change({ target: undefined }, true)}
      />
    </>
  );
}
