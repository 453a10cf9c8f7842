import { BandId } from '@faintward/contracts/light';
import { useQuery } from '@tanstack/react-query';
import { useLocation, useParams, useSearchParams } from 'react-router-dom';
import { paths } from '../app/paths';
import { observationQueries } from '../features/observations/api/observations';
import { TargetObservations } from '../features/observations/components/TargetObservations';
import { proposalQueries } from '../features/proposals/api/proposals';
import { LastChanges } from '../features/proposals/components/LastChanges';
import { distancesBeside, targetQueries } from '../features/targets/api/targets';
import { TargetLine, TargetSheet } from '../features/targets/components/TargetSheet';
import { readOnlyReason } from '../features/targets/words';
import { Loaded, SkeletonBlock } from '../ui/PageStates';
import { PageFrame } from '../ui/PageFrame';

/** As many observations of one target as the sheet shows. */
const pageSize = 100;
/** As many of its last changes. */
const lastChangeCount = 5;

/** The sheet of one target. */
export function Component() {
  const { proposalId = '', targetId = '' } = useParams();
  const [address, setAddress] = useSearchParams();
  const state: unknown = useLocation().state;
  const bandId = BandId.safeParse(address.get('band')).data;
  const proposal = useQuery(proposalQueries.detail(proposalId));
  const target = useQuery(targetQueries.one(proposalId, targetId));
  const beside = useQuery({
    ...distancesBeside('conv70', target.data?.redshift ?? 0),
    enabled: target.data !== undefined,
  });
  const report = useQuery({ ...targetQueries.light(proposalId, targetId, bandId), enabled: target.data !== undefined });
  const history = useQuery(proposalQueries.historyOf(proposalId, { subjectId: targetId, pageSize: lastChangeCount }));
  const observations = useQuery(observationQueries.list(proposalId, { targetId, pageSize }));
  return (
    <PageFrame
      title={target.data?.name ?? 'Target'}
      breadcrumbs={[
        { label: 'My proposals', to: paths.proposals.to() },
        { label: proposal.data?.title ?? 'Proposal', to: paths.proposal.to(proposalId) },
        // Back to the page, the order and the search that the table had.
        { label: 'Targets', to: `${paths.proposalSection.to(proposalId, 'targets')}${searchOf(state)}` },
      ]}
      below={target.data && <TargetLine target={target.data} />}
    >
      <Loaded query={proposal} what="The proposal" skeleton={<SkeletonBlock label="The proposal: loading" />}>
        {(own) => (
          <Loaded query={target} what="The target">
            {(one) => (
              <TargetSheet
                proposalId={proposalId}
                target={one}
                beside={beside}
                canEdit={own.abilities.canEditTargets}
                readOnlyReason={readOnlyReason(own.state)}
                report={report}
                onBandChange={(band) => setAddress({ band }, { replace: true, state })}
                observations={
                  <Loaded query={observations} what="Its observations">
                    {(list) => <TargetObservations proposalId={proposalId} observations={list.rows} />}
                  </Loaded>
                }
                history={
                  <Loaded query={history} what="Its changes">
                    {(list) => <LastChanges proposalId={proposalId} list={list} />}
                  </Loaded>
                }
              />
            )}
          </Loaded>
        )}
      </Loaded>
    </PageFrame>
  );
}

function searchOf(state: unknown): string {
  const search = typeof state === 'object' && state !== null && 'search' in state ? state.search : undefined;
  return typeof search === 'string' ? search : '';
}
