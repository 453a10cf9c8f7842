import type { TeamMember } from '@faintward/contracts/proposals';
import { TeamAccess } from '@faintward/contracts/permissions';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import MenuItem from '@mui/material/MenuItem';
import Stack from '@mui/material/Stack';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { paths } from '../../../app/paths';
import { ConfirmDialog } from '../../../ui/ConfirmDialog';
import { Panel } from '../../../ui/Panel';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { TimeDisplay } from '../../../ui/TimeDisplay';
import { useTeamMutations } from '../api/proposals';
import { AddMember } from './AddMember';
import { accessWords } from './words';

/** The team: who may do what, and who has signed. */
export function TeamView({
  proposalId,
  members,
  canManage,
}: {
  proposalId: string;
  members: readonly TeamMember[];
  canManage: boolean;
}) {
  const { add, setAccess, remove, sign } = useTeamMutations(proposalId);
  const [leaving, setLeaving] = useState<TeamMember>();
  const navigate = useNavigate();
  const me = members.find((member) => member.isMe);
  return (
    <Stack sx={{ gap: 2.25 }}>
      {me && !me.signedAt && (
        <Panel title="Your signature" note="Signing says that you have read the proposal and agree to be named on it.">
          <Button variant="contained" loading={sign.isPending} onClick={() => sign.mutate()}>
            Sign the proposal
          </Button>
          {sign.error && <ProblemDisplay error={sign.error} what="Not signed" />}
        </Panel>
      )}
      <Panel title="Team" flush>
        <Box component="ul" sx={{ listStyle: 'none', m: 0, p: 0 }}>
          {members.map((member) => (
            <Box
              component="li"
              key={member.memberId}
              sx={{
                display: 'grid',
                gridTemplateColumns: { xs: '1fr', md: 'minmax(0, 3fr) 190px minmax(0, 2fr) 110px' },
                gap: { xs: 1, md: 2 },
                alignItems: 'center',
                borderTop: 1,
                borderColor: 'divider',
                px: { xs: 2, md: 2.5 },
                py: 1.25,
              }}
            >
              <Box sx={{ minWidth: 0 }}>
                <strong>{member.name}</strong>
                {member.isMe && ' (you)'}
                <Typography variant="body2" color="textSecondary">
                  {member.institutionName ?? 'no institution given'}
                </Typography>
              </Box>
              <Box>
                {member.isPrincipal ? (
                  'principal investigator'
                ) : canManage ? (
                  <TextField
                    select
                    label={`Access of ${member.name}`}
                    size="small"
                    fullWidth
                    value={member.access}
                    disabled={setAccess.isPending}
                    onChange={(event) =>
                      setAccess.mutate({
                        memberId: member.memberId,
                        version: member.version,
                        access: TeamAccess.parse(event.target.value),
                      })
                    }
                  >
                    {TeamAccess.options.map((access) => (
                      <MenuItem key={access} value={access}>
                        {accessWords[access]}
                      </MenuItem>
                    ))}
                  </TextField>
                ) : (
                  accessWords[member.access]
                )}
              </Box>
              <Typography variant="body2" color="textSecondary" component="div">
                {member.signedAt ? (
                  <>
                    signed <TimeDisplay instant={member.signedAt} short />
                  </>
                ) : (
                  'not signed yet'
                )}
              </Typography>
              <Box sx={{ textAlign: { md: 'right' } }}>
                {!member.isPrincipal && (canManage || member.isMe) && (
                  <Button size="small" variant="text" onClick={() => setLeaving(member)}>
                    {member.isMe ? 'Leave' : 'Remove'}
                  </Button>
                )}
              </Box>
            </Box>
          ))}
        </Box>
        {setAccess.error && (
          <Box sx={{ p: 2 }}>
            <ProblemDisplay error={setAccess.error} what="The access was not changed" />
          </Box>
        )}
      </Panel>
      {canManage && <AddMember add={add} present={members.flatMap((member) => member.personId ?? [])} />}
      <ConfirmDialog
        open={leaving !== undefined}
        title={leaving?.isMe ? 'Leave this proposal?' : `Remove ${leaving?.name ?? ''} from the team?`}
        confirmLabel={leaving?.isMe ? 'Leave the team' : 'Remove from the team'}
        destructive
        pending={remove.isPending}
        error={remove.error}
        onCancel={() => {
          setLeaving(undefined);
          remove.reset();
        }}
        onConfirm={() => {
          if (!leaving) return;
          remove.mutate(
            { memberId: leaving.memberId, version: leaving.version },
            {
              onSuccess: () => {
                setLeaving(undefined);
                if (leaving.isMe) void navigate(paths.proposals.to());
              },
            },
          );
        }}
      >
        {leaving?.isMe
          ? 'You will not see the proposal any more, unless the principal investigator adds you again.'
          : 'What this person changed stays in the history.'}
      </ConfirmDialog>
    </Stack>
  );
}
