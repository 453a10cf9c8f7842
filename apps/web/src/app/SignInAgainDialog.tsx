import { Me, SignInRequest } from '@faintward/contracts/accounts';
import Button from '@mui/material/Button';
import Dialog from '@mui/material/Dialog';
import DialogActions from '@mui/material/DialogActions';
import DialogContent from '@mui/material/DialogContent';
import DialogTitle from '@mui/material/DialogTitle';
import Stack from '@mui/material/Stack';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { api, ApiError } from '../lib/api';
import { sessionQueries } from '../lib/queries/session';
import { settleSignIn } from '../lib/session';
import { ProblemDisplay } from '../ui/ProblemDisplay';
import { TextField } from '../ui/form/fields';
import { showServerErrors, useZodForm } from '../ui/form/useZodForm';

/** See `SignInAgain`: loaded when it is needed, since most sessions never see it. */
export function SignInAgainDialog({ email }: { email: string }) {
  const queryClient = useQueryClient();
  const [error, setError] = useState<unknown>(null);
  const form = useZodForm(SignInRequest, { defaultValues: { email, password: '' } });
  const { isSubmitting } = form.formState;

  const submit = form.handleSubmit(async (body) => {
    setError(null);
    try {
      const me = await api({ method: 'POST', path: '/session', body, schema: Me, onSignedOut: 'throw' });
      if (email && me.email !== email) {
        // Somebody else: what waits belongs to the first person, so it must not be sent in the second one's name.
        settleSignIn(false);
        queryClient.clear();
        window.location.assign('/');
        return;
      }
      queryClient.setQueryData(sessionQueries.me().queryKey, me);
      settleSignIn(true);
    } catch (failure) {
      if (!showServerErrors(form, failure, ['email', 'password'])) setError(failure);
    }
  });

  return (
    <Dialog open aria-labelledby="sign-in-again" maxWidth="xs" fullWidth>
      <form onSubmit={(event) => void submit(event)} noValidate>
        <DialogTitle id="sign-in-again">Your session has ended</DialogTitle>
        <DialogContent>
          <Stack sx={{ gap: 2 }}>
            <span>Sign in again to go on. What you have typed is still on this page.</span>
            {Boolean(error) && <ProblemDisplay error={error} what={error instanceof ApiError ? '' : 'Not signed in'} />}
            <fieldset disabled={isSubmitting} style={{ border: 0, padding: 0, margin: 0, display: 'grid', gap: 16 }}>
              <TextField control={form.control} name="email" label="E-mail" type="email" autoComplete="username" />
              <TextField
                control={form.control}
                name="password"
                label="Password"
                type="password"
                autoComplete="current-password"
                autoFocus
              />
            </fieldset>
          </Stack>
        </DialogContent>
        <DialogActions sx={{ px: 3, pb: 2 }}>
          <Button onClick={() => settleSignIn(false)}>Stay signed out</Button>
          <Button type="submit" variant="contained" loading={isSubmitting}>
            Sign in
          </Button>
        </DialogActions>
      </form>
    </Dialog>
  );
}
