import { SignUpRequest } from '@faintward/contracts/accounts';
import Button from '@mui/material/Button';
import Link from '@mui/material/Link';
import Stack from '@mui/material/Stack';
import { useQuery } from '@tanstack/react-query';
import { Controller } from 'react-hook-form';
import { Link as RouterLink, useNavigate } from 'react-router-dom';
import { paths } from '../app/paths';
import { accountQueries, useSignUp } from '../features/accounts/api/accounts';
import { InstitutionField } from '../features/accounts/components/InstitutionField';
import { PageFrame } from '../ui/PageFrame';
import { Panel } from '../ui/Panel';
import { ProblemDisplay } from '../ui/ProblemDisplay';
import { TextField } from '../ui/form/fields';
import { showServerErrors, useZodForm } from '../ui/form/useZodForm';

const fields = ['email', 'password', 'givenName', 'familyName', 'institutionId'] as const;

export function Component() {
  const institutions = useQuery(accountQueries.institutions());
  const signUp = useSignUp();
  const navigate = useNavigate();
  const form = useZodForm(SignUpRequest, {
    defaultValues: { email: '', password: '', givenName: '', familyName: '', institutionId: null },
  });
  const submit = form.handleSubmit(async (body) => {
    try {
      await signUp.mutateAsync(body);
      await navigate(paths.proposals.to(), { replace: true });
    } catch (error) {
      // Kept in the mutation, which draws it.
      showServerErrors(form, error, fields);
    }
  });
  return (
    <PageFrame title="Sign up" width="reading">
      <Panel>
        <form noValidate onSubmit={(event) => void submit(event)}>
          <Stack sx={{ gap: 2 }}>
            {signUp.error && <ProblemDisplay error={signUp.error} hideFieldErrors />}
            <fieldset
              disabled={signUp.isPending}
              style={{ border: 0, padding: 0, margin: 0, display: 'grid', gap: 16 }}
            >
              <Stack direction={{ xs: 'column', sm: 'row' }} sx={{ gap: 2 }}>
                <TextField control={form.control} name="givenName" label="Given name" autoComplete="given-name" />
                <TextField control={form.control} name="familyName" label="Family name" autoComplete="family-name" />
              </Stack>
              <TextField control={form.control} name="email" label="E-mail" type="email" autoComplete="username" />
              <TextField
                control={form.control}
                name="password"
                label="Password"
                type="password"
                autoComplete="new-password"
                helperText="At least 12 characters. Length is what counts; a sentence is fine."
              />
              <Controller
                control={form.control}
                name="institutionId"
                render={({ field, fieldState }) => (
                  <InstitutionField
                    institutions={institutions.data?.rows ?? []}
                    value={field.value ?? null}
                    onChange={field.onChange}
                    errorMessage={
                      fieldState.error?.message ??
                      (institutions.error
                        ? 'The list could not be loaded; you can set this later in your profile.'
                        : undefined)
                    }
                  />
                )}
              />
            </fieldset>
            <Button type="submit" variant="contained" loading={signUp.isPending}>
              Sign up
            </Button>
            <span>
              Signed up already?{' '}
              <Link underline="always" component={RouterLink} to={paths.signIn.to()}>
                Sign in
              </Link>
            </span>
          </Stack>
        </form>
      </Panel>
    </PageFrame>
  );
}
