import type { Proposal } from '@faintward/contracts/proposals';
import Typography from '@mui/material/Typography';
import { Panel } from '../../../ui/Panel';

/** Summary and keywords for those who only read. */
export function ProposalSummaryView({ proposal }: { proposal: Proposal }) {
  return (
    <Panel
      title="Summary"
      note={[proposal.panelName && `panel ${proposal.panelName}`, proposal.partnerName, proposal.keywords.join(', ')]
        .filter(Boolean)
        .join(' · ')}
    >
      {proposal.abstract ? (
        <Typography variant="reading" component="div" sx={{ whiteSpace: 'pre-wrap' }}>
          {proposal.abstract}
        </Typography>
      ) : (
        <Typography color="textSecondary">There is no summary yet.</Typography>
      )}
    </Panel>
  );
}
