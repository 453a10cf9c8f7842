import { PasswordReset } from '@faintward/contracts/accounts';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import { Link as RouterLink, useParams } from 'react-router-dom';
import { paths } from '../app/paths';
import { useResetPassword } from '../features/accounts/api/accounts';
import { ApiError } from '../lib/api';
import { Note } from '../ui/Note';
import { PageFrame } from '../ui/PageFrame';
import { Panel } from '../ui/Panel';
import { ProblemDisplay } from '../ui/ProblemDisplay';
import { TextField } from '../ui/form/fields';
import { showServerErrors, useZodForm } from '../ui/form/useZodForm';

export function Component() {
  const { token = '' } = useParams();
  const reset = useResetPassword(token);
  const form = useZodForm(PasswordReset, { defaultValues: { password: '' } });
  const submit = form.handleSubmit(async (body) => {
    try {
      await reset.mutateAsync(body);
    } catch (error) {
      // Kept in the mutation, which draws it.
      showServerErrors(form, error, ['password']);
    }
  });
  const isExpired = reset.error instanceof ApiError && reset.error.code === 'link-expired';
  return (
    <PageFrame title="Set a new password" width="reading">
      <Panel>
        {reset.isSuccess ? (
          <Note
            tone="good"
            live
            action={
              <Button variant="contained" component={RouterLink} to={paths.signIn.to()}>
                Sign in
              </Button>
            }
          >
            Your password has been changed, and you have been signed out everywhere.
          </Note>
        ) : (
          <form noValidate onSubmit={(event) => void submit(event)}>
            <Stack sx={{ gap: 2 }}>
              {reset.error && <ProblemDisplay error={reset.error} hideFieldErrors />}
              {isExpired && (
                <Button component={RouterLink} to={paths.forgottenPassword.to()}>
                  Ask for a new link
                </Button>
              )}
              <TextField
                control={form.control}
                name="password"
                label="New password"
                type="password"
                autoComplete="new-password"
                helperText="At least 12 characters. Length is what counts; a sentence is fine."
              />
              <Button type="submit" variant="contained" loading={reset.isPending}>
                Set the password
              </Button>
            </Stack>
          </form>
        )}
      </Panel>
    </PageFrame>
  );
}
