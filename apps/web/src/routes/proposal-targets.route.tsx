import { Id } from '@faintward/contracts/common';
import { TargetSort } from '@faintward/contracts/targets';
import { useQuery } from '@tanstack/react-query';
import { useCallback, useMemo } from 'react';
import { Navigate, useLocation, useNavigate, useSearchParams } from 'react-router-dom';
import { paths } from '../app/paths';
import { useProposal } from '../features/proposals/components/useProposal';
import { targetQueries } from '../features/targets/api/targets';
import { TargetsView } from '../features/targets/components/TargetsView';
import { readOnlyReason } from '../features/targets/words';
import { useTableParams } from '../lib/useTableParams';

/** The longest page that the table shows at once; there may be thousands of rows. */
const pageSize = 100;

/** The targets along cosmic time and as a table. An address that names one leads to its sheet. */
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
  const navigate = useNavigate();
  const { search } = useLocation();
  const open = useCallback(
    (id: string) => void navigate(paths.target.to(proposalId, id), { state: { search } }),
    [navigate, proposalId, search],
  );

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
  if (targetId !== undefined) return <Navigate replace to={paths.target.to(proposalId, targetId)} />;
  return (
    <TargetsView
      proposalId={proposalId}
      page={page}
      cosmicTime={cosmicTime}
      params={params}
      withNotices={withNotices}
      onWithNotices={(checked) => change({ notices: checked ? '1' : undefined, page: undefined }, true)}
      canEdit={abilities.canEditTargets}
      readOnlyReason={readOnlyReason(state)}
      onOpen={open}
    />
  );
}
