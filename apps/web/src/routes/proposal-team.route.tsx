import { useQuery } from '@tanstack/react-query';
import { proposalQueries } from '../features/proposals/api/proposals';
import { TeamView } from '../features/proposals/components/TeamView';
import { useProposal } from '../features/proposals/components/useProposal';
import { Loaded } from '../ui/PageStates';

/** The team of a proposal. */
export function Component() {
  const { proposalId, abilities } = useProposal();
  const query = useQuery(proposalQueries.members(proposalId));
  return (
    <Loaded query={query} what="The team">
      {(list) => <TeamView proposalId={proposalId} members={list.rows} canManage={abilities.canManageTeam} />}
    </Loaded>
  );
}
