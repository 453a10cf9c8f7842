import type { ProposalSummary } from '@faintward/contracts/proposals';
import Box from '@mui/material/Box';
import Link from '@mui/material/Link';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { Link as RouterLink } from 'react-router-dom';
import { paths } from '../../../app/paths';
import { counted } from '../../../lib/format';
import { Panel } from '../../../ui/Panel';
import { Ago, Countdown, TimeDisplay } from '../../../ui/TimeDisplay';
import { accessWords, describeHours, stateWords } from './words';

const isLive = (proposal: ProposalSummary) => proposal.state === 'draft' || proposal.state === 'submitted';

/** One's proposals: those that can still be worked on first, each with what it lacks and what others changed last. */
export function ProposalList({ proposals }: { proposals: readonly ProposalSummary[] }) {
  const live = proposals.filter(isLive);
  const rest = proposals.filter((proposal) => !isLive(proposal));
  return (
    <Stack sx={{ gap: 3 }}>
      {live.length > 0 && <ProposalGroup title="Before the deadline" proposals={live} />}
      {rest.length > 0 && <ProposalGroup title="In review and decided" proposals={rest} />}
    </Stack>
  );
}

function ProposalGroup({ title, proposals }: { title: string; proposals: readonly ProposalSummary[] }) {
  return (
    <Panel title={title} flush>
      <Box component="ul" sx={{ listStyle: 'none', m: 0, p: 0 }}>
        {proposals.map((proposal) => (
          <Box
            component="li"
            key={proposal.proposalId}
            sx={{ borderTop: 1, borderColor: 'divider', px: { xs: 2, md: 2.5 }, py: 1.75 }}
          >
            <ProposalEntry proposal={proposal} />
          </Box>
        ))}
      </Box>
    </Panel>
  );
}

function ProposalEntry({ proposal }: { proposal: ProposalSummary }) {
  const part = proposal.isPrincipal
    ? 'you lead it'
    : `${proposal.principalName} leads it; you: ${accessWords[proposal.myAccess]}`;
  return (
    <Box
      sx={{
        display: 'grid',
        gridTemplateColumns: { xs: '1fr', md: 'minmax(0, 5fr) minmax(0, 3fr) minmax(0, 3fr)' },
        gap: { xs: 1, md: 3 },
      }}
    >
      <Box sx={{ minWidth: 0 }}>
        <Typography variant="body2" color="textSecondary">
          <Typography variant="figure" component="span">
            {proposal.label}
          </Typography>
          {' · '}
          {proposal.semesterName}
          {' · '}
          <Box component="strong" sx={{ color: 'text.primary' }}>
            {stateWords[proposal.state]}
          </Box>
        </Typography>
        <Link
          component={RouterLink}
          to={paths.proposal.to(proposal.proposalId)}
          color="text.primary"
          sx={{ fontFamily: 'h1.fontFamily', fontWeight: 600, fontSize: '1.0625rem', overflowWrap: 'anywhere' }}
        >
          {proposal.title}
        </Link>
        <Typography variant="body2" color="textSecondary">
          {part}
        </Typography>
      </Box>
      <Box sx={{ fontSize: '0.875rem', minWidth: 0 }}>
        <div>
          {counted(proposal.targetCount, 'target')}, {describeHours(proposal.requestedHours)}
        </div>
        {isLive(proposal) && (
          <Box sx={{ color: 'text.secondary' }}>
            closes in <Countdown until={proposal.deadlineAt} passed="closed" />
            {' · '}
            <TimeDisplay instant={proposal.deadlineAt} short />
          </Box>
        )}
        {isLive(proposal) && proposal.lacking.length > 0 && (
          <Box sx={{ color: 'error.main' }}>lacks: {proposal.lacking.join(', ')}</Box>
        )}
        {isLive(proposal) && proposal.lacking.length === 0 && (
          <Box sx={{ color: 'success.main' }}>nothing is missing</Box>
        )}
      </Box>
      <Box sx={{ fontSize: '0.875rem', color: 'text.secondary', minWidth: 0, overflowWrap: 'anywhere' }}>
        {proposal.latestChange ? (
          <>
            <Ago since={Date.parse(proposal.latestChange.at)} />
            {proposal.latestChange.personName && <>, {proposal.latestChange.personName}</>}
            <div>{proposal.latestChange.summary}</div>
          </>
        ) : (
          'no changes yet'
        )}
      </Box>
    </Box>
  );
}
