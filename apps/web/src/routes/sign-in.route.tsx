import { SignInRequest, type Me } from '@faintward/contracts/accounts';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Link from '@mui/material/Link';
import Stack from '@mui/material/Stack';
import { useQuery } from '@tanstack/react-query';
import { Link as RouterLink, useNavigate, useSearchParams } from 'react-router-dom';
import { paths, safeNext } from '../app/paths';
import { accountQueries, useSignIn } from '../features/accounts/api/accounts';
import { DemoPeopleList } from '../features/accounts/components/DemoPeopleList';
import { PageFrame } from '../ui/PageFrame';
import { Panel } from '../ui/Panel';
import { ProblemDisplay } from '../ui/ProblemDisplay';
import { TextField } from '../ui/form/fields';
import { showServerErrors, useZodForm } from '../ui/form/useZodForm';

/** Where a person's work most likely is. */
function landing(me: Me): string {
  const chaired = me.panels.find((panel) => panel.role === 'chair');
  if (chaired) return paths.ranking.to(chaired.panelId);
  if (me.panels.length > 0) return paths.reviews.to();
  if (me.isAdministrator) return paths.administration.to();
  if (me.isStaff) return paths.semesters.to();
  return paths.proposals.to();
}

export function Component() {
  const [searchParams] = useSearchParams();
  const next = safeNext(searchParams.get('next'));
  const navigate = useNavigate();
  const signIn = useSignIn();
  const demo = useQuery(accountQueries.demoPeople()).data;
  const form = useZodForm(SignInRequest, { defaultValues: { email: '', password: '' } });

  async function enter(body: SignInRequest) {
    try {
      const me = await signIn.mutateAsync(body);
      await navigate(next ?? landing(me), {
        replace: true,
      });
    } catch (error) {
      // Kept in the mutation, which draws it; field errors also go under their fields.
      showServerErrors(form, error, ['email', 'password']);
    }
  }
  const pendingDemo = signIn.isPending && demo?.people.some((person) => person.email === signIn.variables.email);

  return (
    <PageFrame title="Sign in" width={demo ? 'page' : 'reading'}>
      <Box
        sx={{
          display: 'grid',
          gap: 3,
          gridTemplateColumns: demo ? { xs: 'minmax(0, 1fr)', md: 'minmax(0, 2fr) minmax(0, 3fr)' } : 'minmax(0, 1fr)',
          alignItems: 'start',
        }}
      >
        <Panel>
          <form noValidate onSubmit={(event) => void form.handleSubmit((body) => enter(body))(event)}>
            <Stack sx={{ gap: 2 }}>
              {signIn.error && <ProblemDisplay error={signIn.error} hideFieldErrors />}
              <fieldset
                disabled={signIn.isPending}
                style={{ border: 0, padding: 0, margin: 0, display: 'grid', gap: 16 }}
              >
                <TextField control={form.control} name="email" label="E-mail" type="email" autoComplete="username" />
                <TextField
                  control={form.control}
                  name="password"
                  label="Password"
                  type="password"
                  autoComplete="current-password"
                />
              </fieldset>
              <Button type="submit" variant="contained" loading={signIn.isPending && !pendingDemo}>
                Sign in
              </Button>
              <Stack direction="row" sx={{ justifyContent: 'space-between', flexWrap: 'wrap', gap: 1 }}>
                <Link underline="always" component={RouterLink} to={paths.forgottenPassword.to()}>
                  Forgotten password
                </Link>
                <Link underline="always" component={RouterLink} to={paths.signUp.to()}>
                  Sign up
                </Link>
              </Stack>
            </Stack>
          </form>
        </Panel>
        {demo && (
          <Panel
            title="Demo people"
            note={
              <>
                Invented people of an invented observatory, one click away. Mail to them ends in the{' '}
                <Link underline="always" component={RouterLink} to={paths.mailbox.to()}>
                  mailbox
                </Link>
                .
              </>
            }
          >
            <DemoPeopleList
              people={demo.people}
              pendingEmail={pendingDemo ? signIn.variables?.email : undefined}
              onChoose={(email) => void enter({ email, password: demo.password })}
            />
          </Panel>
        )}
      </Box>
    </PageFrame>
  );
}
