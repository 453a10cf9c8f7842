import { PasswordChange, ProfilePatch } from '@faintward/contracts/accounts';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import MuiTextField from '@mui/material/TextField';
import { useQuery } from '@tanstack/react-query';
import { Controller } from 'react-hook-form';
import { accountQueries, useChangePassword, useSaveProfile } from '../features/accounts/api/accounts';
import { InstitutionField } from '../features/accounts/components/InstitutionField';
import { useMe } from '../lib/useMe';
import { useNotices } from '../ui/Notices';
import { PageFrame } from '../ui/PageFrame';
import { Panel } from '../ui/Panel';
import { ProblemDisplay } from '../ui/ProblemDisplay';
import { TextField } from '../ui/form/fields';
import { LeaveGuard } from '../ui/form/LeaveGuard';
import { showServerErrors, useZodForm } from '../ui/form/useZodForm';

const profileFields = ['givenName', 'familyName', 'institutionId', 'orcid'] as const;

export function Component() {
  const me = useMe();
  return (
    <PageFrame title="Profile" eyebrow={me.email} width="reading">
      <Stack sx={{ gap: 3 }}>
        <ProfileForm />
        <PasswordForm />
        {me.panels.length > 0 && (
          <Panel title="Committees">
            <ul style={{ margin: 0, paddingInlineStart: 20 }}>
              {me.panels.map((panel) => (
                <li key={panel.panelId}>
                  {panel.panelName}, {panel.semesterName}: {panel.role === 'chair' ? 'chair' : 'member'}
                </li>
              ))}
            </ul>
          </Panel>
        )}
      </Stack>
    </PageFrame>
  );
}

function ProfileForm() {
  const me = useMe();
  const announce = useNotices();
  const institutions = useQuery(accountQueries.institutions());
  const save = useSaveProfile();
  const form = useZodForm(ProfilePatch, {
    defaultValues: {
      givenName: me.givenName,
      familyName: me.familyName,
      institutionId: me.institution?.institutionId ?? null,
      orcid: me.orcid,
    },
  });
  const submit = form.handleSubmit(async (body, _event) => {
    try {
      await save.mutateAsync(body);
      form.reset(form.getValues());
      announce('Profile saved.');
    } catch (error) {
      // Kept in the mutation, which draws it.
      showServerErrors(form, error, profileFields);
    }
  });
  return (
    <Panel title="Name and institution">
      <form noValidate onSubmit={(event) => void submit(event)}>
        <Stack sx={{ gap: 2 }}>
          {save.error && <ProblemDisplay error={save.error} what="Not saved" hideFieldErrors />}
          <Stack direction={{ xs: 'column', sm: 'row' }} sx={{ gap: 2 }}>
            <TextField control={form.control} name="givenName" label="Given name" autoComplete="given-name" />
            <TextField control={form.control} name="familyName" label="Family name" autoComplete="family-name" />
          </Stack>
          <Controller
            control={form.control}
            name="institutionId"
            render={({ field, fieldState }) => (
              <InstitutionField
                institutions={institutions.data?.rows ?? (me.institution ? [asOption(me.institution)] : [])}
                value={field.value ?? null}
                onChange={field.onChange}
                errorMessage={
                  fieldState.error?.message ?? (institutions.error ? 'The list could not be loaded.' : undefined)
                }
              />
            )}
          />
          <Controller
            control={form.control}
            name="orcid"
            render={({ field: { value, onChange }, fieldState }) => (
              <OrcidField value={value ?? ''} onChange={onChange} errorMessage={fieldState.error?.message} />
            )}
          />
          <Button type="submit" variant="contained" loading={save.isPending} sx={{ alignSelf: 'flex-start' }}>
            Save the profile
          </Button>
        </Stack>
      </form>
      <LeaveGuard when={form.formState.isDirty} what="Changes of your profile" />
    </Panel>
  );
}

function asOption(institution: { institutionId: string; name: string }) {
  return { ...institution, country: '', partnerId: null, partnerName: null };
}

function OrcidField({
  value,
  onChange,
  errorMessage,
}: {
  value: string;
  onChange: (orcid: string | null) => void;
  errorMessage: string | undefined;
}) {
  return (
    <MuiTextField
      label="ORCID iD"
      name="orcid"
      value={value}
      onChange={(event) => onChange(event.target.value === '' ? null : event.target.value)}
      error={errorMessage !== undefined}
      helperText={errorMessage ?? 'Optional, such as 0000-0002-1825-0097.'}
    />
  );
}

function PasswordForm() {
  const announce = useNotices();
  const change = useChangePassword();
  const form = useZodForm(PasswordChange, { defaultValues: { currentPassword: '', newPassword: '' } });
  const submit = form.handleSubmit(async (body) => {
    try {
      await change.mutateAsync(body);
      form.reset();
      announce('Password changed. Other devices have been signed out.');
    } catch (error) {
      // Kept in the mutation, which draws it.
      showServerErrors(form, error, ['currentPassword', 'newPassword']);
    }
  });
  return (
    <Panel title="Password">
      <form noValidate onSubmit={(event) => void submit(event)}>
        <Stack sx={{ gap: 2 }}>
          {change.error && <ProblemDisplay error={change.error} what="Not changed" hideFieldErrors />}
          <TextField
            control={form.control}
            name="currentPassword"
            label="Present password"
            type="password"
            autoComplete="current-password"
          />
          <TextField
            control={form.control}
            name="newPassword"
            label="New password"
            type="password"
            autoComplete="new-password"
            helperText="At least 12 characters."
          />
          <Button type="submit" loading={change.isPending} sx={{ alignSelf: 'flex-start' }}>
            Change the password
          </Button>
        </Stack>
      </form>
    </Panel>
  );
}
