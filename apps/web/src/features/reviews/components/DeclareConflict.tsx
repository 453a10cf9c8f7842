import { ConflictDeclaration } from '@faintward/contracts/reviews';
import Button from '@mui/material/Button';
import Dialog from '@mui/material/Dialog';
import DialogActions from '@mui/material/DialogActions';
import DialogContent from '@mui/material/DialogContent';
import DialogTitle from '@mui/material/DialogTitle';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { paths } from '../../../app/paths';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { TextField } from '../../../ui/form/fields';
import { showServerErrors, useZodForm } from '../../../ui/form/useZodForm';
import { useDeclareConflict } from '../api/reviews';

/** "I must not judge this": with a reason, for the record. */
export function DeclareConflict({ proposalId }: { proposalId: string }) {
  const [open, setOpen] = useState(false);
  const declare = useDeclareConflict(proposalId);
  const navigate = useNavigate();
  const form = useZodForm(ConflictDeclaration, { defaultValues: { reason: '' } });
  const submit = form.handleSubmit(async (input) => {
    const done = await declare
      .mutateAsync(input)
      .catch((error: unknown) => void showServerErrors(form, error, ['reason']));
    if (done) await navigate(paths.reviews.to());
  });
  return (
    <>
      <Button onClick={() => setOpen(true)}>Declare a conflict</Button>
      <Dialog open={open} onClose={() => setOpen(false)} aria-labelledby="conflict-title" maxWidth="sm" fullWidth>
        <form onSubmit={(event) => void submit(event)} noValidate>
          <DialogTitle id="conflict-title">Declare a conflict?</DialogTitle>
          <DialogContent>
            <Stack sx={{ gap: 2 }}>
              <Typography>
                You will see nothing more of this proposal, anywhere, and your scores on it no longer count. The chair
                sees that there is a conflict.
              </Typography>
              <TextField
                control={form.control}
                name="reason"
                label="What connects you"
                multiline
                minRows={2}
                autoFocus
                fullWidth
              />
              {declare.error && <ProblemDisplay error={declare.error} what="Not declared" />}
            </Stack>
          </DialogContent>
          <DialogActions sx={{ px: 3, pb: 2 }}>
            <Button onClick={() => setOpen(false)}>Cancel</Button>
            <Button type="submit" variant="contained" color="error" loading={declare.isPending}>
              Declare the conflict
            </Button>
          </DialogActions>
        </form>
      </Dialog>
    </>
  );
}
