import type { Panel as PanelData } from '@faintward/contracts/reviews';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Chip from '@mui/material/Chip';
import MenuItem from '@mui/material/MenuItem';
import Stack from '@mui/material/Stack';
import Table from '@mui/material/Table';
import TableBody from '@mui/material/TableBody';
import TableCell from '@mui/material/TableCell';
import TableContainer from '@mui/material/TableContainer';
import TableHead from '@mui/material/TableHead';
import TableRow from '@mui/material/TableRow';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import { useState } from 'react';
import { counted } from '../../../lib/format';
import { EmptyState } from '../../../ui/EmptyState';
import { Note } from '../../../ui/Note';
import { Panel } from '../../../ui/Panel';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { useAssignments } from '../api/panels';
import { hoursText } from './RankingCells';

const stateWords = { toRead: 'to read', begun: 'begun', complete: 'complete', conflict: 'conflict' };

/** Who reads what: evenly by the system, or by hand. */
export function AssignmentView({ panel }: { panel: PanelData }) {
  return (
    <Stack sx={{ gap: 2.25 }}>
      {panel.isFinal && <Note tone="good">The ranking of this panel is final.</Note>}
      {panel.hiddenCount > 0 && <Note>{counted(panel.hiddenCount, 'proposal')} kept from you for a conflict.</Note>}
      {!panel.isFinal && panel.proposals.length > 0 && <AutomaticPanel panel={panel} />}
      <MembersPanel panel={panel} />
      <ProposalsPanel panel={panel} />
    </Stack>
  );
}

function AutomaticPanel({ panel }: { panel: PanelData }) {
  const { automatic } = useAssignments(panel.panelId);
  const [count, setCount] = useState(3);
  return (
    <Panel
      title="Assign evenly"
      note="Fills every proposal up to this many reviewers: no conflicts, and loads as equal as they can be. What is assigned already stays."
    >
      <Stack direction="row" sx={{ gap: 1.5, alignItems: 'center', flexWrap: 'wrap' }}>
        <TextField
          select
          label="Reviewers for each proposal"
          value={count}
          onChange={(event) => setCount(Number(event.target.value))}
          sx={{ width: 230 }}
        >
          {[1, 2, 3, 4, 5, 6, 7, 8].map((option) => (
            <MenuItem key={option} value={option}>
              {option}
            </MenuItem>
          ))}
        </TextField>
        <Button
          variant="contained"
          loading={automatic.isPending}
          onClick={() => automatic.mutate({ reviewersPerProposal: count })}
        >
          Assign
        </Button>
      </Stack>
      <Box aria-live="polite" sx={{ mt: 1.25 }}>
        {automatic.data && (
          <Typography>
            {counted(automatic.data.assignedCount, 'review')} assigned; each member now has{' '}
            {automatic.data.reviewsPerMember.least} to {automatic.data.reviewsPerMember.most}.
          </Typography>
        )}
        {automatic.data && automatic.data.shortProposalLabels.length > 0 && (
          <Note tone="warning">
            Not enough members without a conflict for: {automatic.data.shortProposalLabels.join(', ')}.
          </Note>
        )}
        {automatic.error && <ProblemDisplay error={automatic.error} what="Nothing was assigned" />}
      </Box>
    </Panel>
  );
}

function MembersPanel({ panel }: { panel: PanelData }) {
  return (
    <Panel title="Members" flush>
      <TableContainer tabIndex={0} role="region" aria-label="Members of the panel">
        <Table size="small">
          <TableHead>
            <TableRow>
              <TableCell>Name</TableCell>
              <TableCell>Institution</TableCell>
              <TableCell align="right">Complete</TableCell>
              <TableCell align="right">Assigned</TableCell>
              <TableCell align="right">Conflicts</TableCell>
            </TableRow>
          </TableHead>
          <TableBody>
            {panel.members.map((member) => (
              <TableRow key={member.personId}>
                <TableCell>
                  {member.name}
                  {member.role === 'chair' && ' (chair)'}
                </TableCell>
                <TableCell>{member.institutionName ?? '—'}</TableCell>
                <TableCell align="right">{member.completeCount}</TableCell>
                <TableCell align="right">{member.assignedCount}</TableCell>
                <TableCell align="right">{member.conflictCount}</TableCell>
              </TableRow>
            ))}
          </TableBody>
        </Table>
      </TableContainer>
    </Panel>
  );
}

function ProposalsPanel({ panel }: { panel: PanelData }) {
  const { assign, unassign } = useAssignments(panel.panelId);
  const isBusy = assign.isPending || unassign.isPending;
  if (panel.proposals.length === 0) {
    return (
      <Panel title="Proposals">
        <EmptyState title="No proposal has been submitted to this panel yet" />
      </Panel>
    );
  }
  return (
    <Panel title={counted(panel.proposals.length, 'proposal')} flush>
      {(assign.error ?? unassign.error) && (
        <Box sx={{ p: 2 }}>
          <ProblemDisplay error={assign.error ?? unassign.error} what="Not changed" />
        </Box>
      )}
      <Box component="ul" sx={{ listStyle: 'none', m: 0, p: 0 }}>
        {panel.proposals.map((proposal) => {
          const present = new Set(proposal.reviewers.map((reviewer) => reviewer.personId));
          const free = panel.members.filter(
            (member) => !present.has(member.personId) && !proposal.conflictedPersonIds.includes(member.personId),
          );
          return (
            <Box
              component="li"
              key={proposal.proposalId}
              sx={{
                display: 'grid',
                gridTemplateColumns: { xs: 'minmax(0, 1fr)', md: 'minmax(0, 2fr) minmax(0, 3fr) 220px' },
                gap: 1.5,
                alignItems: 'center',
                borderTop: 1,
                borderColor: 'divider',
                px: { xs: 2, md: 2.5 },
                py: 1.25,
              }}
            >
              <Box sx={{ minWidth: 0 }}>
                <Typography variant="figure" component="span" color="textSecondary">
                  {proposal.label}
                </Typography>{' '}
                <strong>{proposal.title}</strong>
                <Typography variant="body2" color="textSecondary">
                  {hoursText(proposal.requestedHours, ' h')}
                </Typography>
              </Box>
              <Stack direction="row" sx={{ gap: 0.75, flexWrap: 'wrap' }}>
                {proposal.reviewers.length === 0 && <Typography color="warning.main">no reviewer yet</Typography>}
                {proposal.reviewers.map((reviewer) => (
                  <Chip
                    key={reviewer.personId}
                    size="small"
                    variant="outlined"
                    label={`${reviewer.name}${reviewer.isLead ? ', lead' : ''}: ${stateWords[reviewer.state]}`}
                    disabled={isBusy}
                    {...(panel.isFinal || reviewer.state !== 'toRead'
                      ? {}
                      : {
                          onDelete: () =>
                            unassign.mutate({ proposalId: proposal.proposalId, personId: reviewer.personId }),
                        })}
                  />
                ))}
              </Stack>
              {!panel.isFinal && (
                <TextField
                  select
                  size="small"
                  label={`Add a reviewer to ${proposal.label}`}
                  value=""
                  disabled={isBusy || free.length === 0}
                  onChange={(event) =>
                    assign.mutate({
                      proposalId: proposal.proposalId,
                      personId: event.target.value,
                      isLead: !proposal.reviewers.some((reviewer) => reviewer.isLead),
                    })
                  }
                >
                  {free.map((member) => (
                    <MenuItem key={member.personId} value={member.personId}>
                      {member.name}, {counted(member.assignedCount, 'review')}
                    </MenuItem>
                  ))}
                </TextField>
              )}
            </Box>
          );
        })}
      </Box>
    </Panel>
  );
}
