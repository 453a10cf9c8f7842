import { PasswordResetRequest } from '@faintward/contracts/accounts';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import { useAskForPasswordReset } from '../features/accounts/api/accounts';
import { Note } from '../ui/Note';
import { PageFrame } from '../ui/PageFrame';
import { Panel } from '../ui/Panel';
import { ProblemDisplay } from '../ui/ProblemDisplay';
import { TextField } from '../ui/form/fields';
import { showServerErrors, useZodForm } from '../ui/form/useZodForm';

export function Component() {
  const ask = useAskForPasswordReset();
  const form = useZodForm(PasswordResetRequest, { defaultValues: { email: '' } });
  const submit = form.handleSubmit(async (body) => {
    try {
      await ask.mutateAsync(body);
    } catch (error) {
      // Kept in the mutation, which draws it.
      showServerErrors(form, error, ['email']);
    }
  });
  return (
    <PageFrame title="Forgotten password" width="reading">
      <Panel>
        <form noValidate onSubmit={(event) => void submit(event)}>
          <Stack sx={{ gap: 2 }}>
            {ask.isSuccess && (
              <Note tone="good" live>
                If an account has this address, a letter with a link is on its way. The link works once and for a short
                time.
              </Note>
            )}
            {ask.error && <ProblemDisplay error={ask.error} hideFieldErrors />}
            <TextField
              control={form.control}
              name="email"
              label="E-mail"
              type="email"
              autoComplete="username"
              helperText="The address of your account. A link to set a new password will be sent to it."
            />
            <Button type="submit" variant="contained" loading={ask.isPending}>
              Send the link
            </Button>
          </Stack>
        </form>
      </Panel>
    </PageFrame>
  );
}
