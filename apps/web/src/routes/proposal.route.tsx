import type { Proposal, ProposalSection } from '@faintward/contracts/proposals';
import Button from '@mui/material/Button';
import { formatNumber } from '../lib/format';
import { useQuery } from '@tanstack/react-query';
import { Link as RouterLink, Outlet, useLocation, useParams } from 'react-router-dom';
import { paths } from '../app/paths';
import { proposalQueries } from '../features/proposals/api/proposals';
import { stateWords } from '../features/proposals/components/words';
import { Note } from '../ui/Note';
import { PageFrame } from '../ui/PageFrame';
import { isMissing, NothingHere, SkeletonBlock } from '../ui/PageStates';
import { ProblemDisplay } from '../ui/ProblemDisplay';
import { SectionChain, type ChainSection } from '../ui/SectionChain';
import { Countdown, TimeDisplay } from '../ui/TimeDisplay';

const sectionLabels: Record<ProposalSection, string> = {
  targets: 'Targets',
  exposures: 'Exposures',
  time: 'Time',
  case: 'Case',
  team: 'Team',
  submit: 'Submit',
};

/** The frame of one proposal: its state, its title and the chain, with the section inside. */
export function Component() {
  const proposalId = useParams()['proposalId'] ?? '';
  const query = useQuery(proposalQueries.detail(proposalId));
  const { pathname } = useLocation();
  const breadcrumbs = [{ label: 'My proposals', to: paths.proposals.to() }];
  if (!query.data) {
    return (
      <PageFrame title="Proposal" breadcrumbs={breadcrumbs}>
        {!query.error ? (
          <SkeletonBlock label="The proposal: loading" />
        ) : isMissing(query.error) ? (
          <NothingHere />
        ) : (
          <ProblemDisplay
            error={query.error}
            what="The proposal could not be loaded"
            onRetry={() => void query.refetch()}
          />
        )}
      </PageFrame>
    );
  }
  const proposal = query.data;
  return (
    <PageFrame
      title={proposal.title}
      breadcrumbs={breadcrumbs}
      eyebrow={<Eyebrow proposal={proposal} />}
      actions={
        <>
          <Button component={RouterLink} to={paths.proposalSection.to(proposalId, 'history')} variant="text">
            History
          </Button>
          {proposal.abilities.canSubmit && !pathname.endsWith('/submit') && (
            <Button component={RouterLink} to={paths.proposalSection.to(proposalId, 'submit')} variant="contained">
              Check and submit
            </Button>
          )}
        </>
      }
      below={
        <>
          <SectionChain sections={proposal.sections.map((status) => toChainSection(proposalId, status))} />
          {Boolean(query.error) && (
            <Note tone="warning" live>
              The proposal could not be refreshed: what is shown may be out of date.
            </Note>
          )}
          <StateNote proposal={proposal} />
        </>
      }
    >
      <Outlet context={proposal} />
    </PageFrame>
  );
}

function toChainSection(proposalId: string, status: Proposal['sections'][number]): ChainSection {
  return {
    label: sectionLabels[status.section],
    to: paths.proposalSection.to(proposalId, status.section),
    state: status.isComplete ? 'complete' : status.isLacking ? 'lacking' : 'open',
    detail: status.summary,
  };
}

function Eyebrow({ proposal }: { proposal: Proposal }) {
  const isLive = proposal.state === 'draft' || proposal.state === 'submitted';
  return (
    <>
      Proposal {proposal.label} · {stateWords[proposal.state]} · semester {proposal.semesterName}
      {isLive && (
        <>
          {' · closes in '}
          <Countdown until={proposal.deadlineAt} passed="closed" />
          {' · '}
          <TimeDisplay instant={proposal.deadlineAt} siteTimeZone={proposal.siteTimeZone} short />
        </>
      )}
    </>
  );
}

/** Why nothing can be changed, or what a change now means. */
function StateNote({ proposal }: { proposal: Proposal }) {
  switch (proposal.state) {
    case 'draft':
      return null;
    case 'submitted':
      return (
        <Note>
          Submitted. Until the deadline it can still be changed and submitted again; the committee reads the last
          submission, not what has been changed since.
        </Note>
      );
    case 'inReview':
      return <Note>The deadline has passed: the committee is reading what was submitted.</Note>;
    case 'awarded':
      return (
        <Note tone="good">
          {proposal.award
            ? `Awarded ${formatNumber(proposal.award.hours, { decimals: 1 })} h, ${proposal.award.moonClass} time, ${proposal.award.standing}.${proposal.award.reason ? ` ${proposal.award.reason}` : ''}`
            : 'Awarded.'}
        </Note>
      );
    case 'declined':
      return <Note>Declined.{proposal.award?.reason ? ` ${proposal.award.reason}` : ''}</Note>;
    case 'withdrawn':
      return <Note>Withdrawn. The committee does not see it.</Note>;
  }
}
