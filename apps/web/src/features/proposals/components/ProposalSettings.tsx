import { ProposalPatch, type Proposal, type ProposalChoices } from '@faintward/contracts/proposals';
import { CosmologyPresetId } from '@faintward/contracts/cosmology';
import { line, prose } from '@faintward/contracts/common';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import { z } from 'zod';
import { ApiError } from '../../../lib/api';
import { Note } from '../../../ui/Note';
import { Panel } from '../../../ui/Panel';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { useNotices } from '../../../ui/Notices';
import { LeaveGuard } from '../../../ui/form/LeaveGuard';
import { SelectField, TextField } from '../../../ui/form/fields';
import { showServerErrors, useZodForm } from '../../../ui/form/useZodForm';
import { usePatchProposal } from '../api/proposals';

/** What the form holds: keywords as one line, "own" for a cosmology that is no preset and stays as it is. */
const SettingsForm = z.object({
  title: line(200),
  abstract: prose(5000),
  keywords: z.string().max(800),
  panelId: z.string(),
  partnerId: z.string(),
  cosmology: z.union([CosmologyPresetId, z.literal('own')]),
});
type SettingsForm = z.infer<typeof SettingsForm>;

const cosmologyLabels: Record<CosmologyPresetId, string> = {
  planck18: 'Planck 2018',
  planck15: 'Planck 2015',
  wmap9: 'WMAP nine-year',
  conv70: 'Conventional, H₀ 70 and Ωm 0.3',
  ladder73: 'Distance ladder, H₀ 73.04 and Ωm 0.3',
};

/** Title, summary, and what the proposal is put under. */
export function ProposalSettings({ proposal, choices }: { proposal: Proposal; choices: ProposalChoices }) {
  const patch = usePatchProposal(proposal.proposalId);
  const announce = useNotices();
  const form = useZodForm(SettingsForm, { values: toForm(proposal), resetOptions: { keepDirtyValues: true } });
  const isStale = patch.error instanceof ApiError && patch.error.code === 'stale-version';
  const submit = form.handleSubmit(async (values) => {
    const saved = await patch
      .mutateAsync({ version: proposal.version, patch: toPatch(values) })
      .catch(
        (error: unknown) =>
          void showServerErrors(form, error, ['title', 'abstract', 'keywords', 'panelId', 'partnerId']),
      );
    if (saved) {
      form.reset(toForm(saved));
      announce('Saved.');
    }
  });
  return (
    <Panel title="Title, summary and where it belongs">
      <form onSubmit={(event) => void submit(event)} noValidate>
        <LeaveGuard when={form.formState.isDirty} />
        <Stack component="fieldset" disabled={patch.isPending} sx={{ border: 0, p: 0, m: 0, gap: 2.25 }}>
          <TextField control={form.control} name="title" label="Title" fullWidth />
          <TextField
            control={form.control}
            name="abstract"
            label="Summary"
            multiline
            minRows={3}
            maxRows={14}
            fullWidth
          />
          <TextField
            control={form.control}
            name="keywords"
            label="Keywords"
            helperText="Separated by commas; they help to find the right reviewers."
            fullWidth
          />
          <Box sx={{ display: 'grid', gridTemplateColumns: { xs: '1fr', md: '1fr 1fr 1fr' }, gap: 2 }}>
            <SelectField
              control={form.control}
              name="panelId"
              label="Panel"
              options={[
                { value: '', label: 'not chosen yet' },
                ...choices.panels.map((panel) => ({ value: panel.panelId, label: panel.name })),
              ]}
            />
            <SelectField
              control={form.control}
              name="partnerId"
              label="Partner share"
              options={[
                { value: '', label: 'not chosen yet' },
                ...choices.partners.map((partner) => ({ value: partner.partnerId, label: partner.name })),
              ]}
            />
            <SelectField
              control={form.control}
              name="cosmology"
              label="Cosmology"
              helperText="Changing it recomputes every target and exposure."
              options={[
                ...CosmologyPresetId.options.map((id) => ({ value: id, label: cosmologyLabels[id] })),
                ...(typeof proposal.cosmology === 'string' ? [] : [{ value: 'own', label: 'Own parameters' }]),
              ]}
            />
          </Box>
          {isStale && (
            <Note tone="warning" live>
              A colleague changed these fields meanwhile. What you have not touched shows their version now; save again
              to keep yours where you did.
            </Note>
          )}
          {patch.error && !isStale && <ProblemDisplay error={patch.error} what="Not saved" />}
          <Stack direction="row" sx={{ gap: 1.25 }}>
            <Button type="submit" variant="contained" loading={patch.isPending} disabled={!form.formState.isDirty}>
              Save
            </Button>
            <Button onClick={() => form.reset(toForm(proposal))} disabled={!form.formState.isDirty}>
              Discard changes
            </Button>
          </Stack>
        </Stack>
      </form>
    </Panel>
  );
}

function toForm(proposal: Proposal): SettingsForm {
  return {
    title: proposal.title,
    abstract: proposal.abstract,
    keywords: proposal.keywords.join(', '),
    panelId: proposal.panelId ?? '',
    partnerId: proposal.partnerId ?? '',
    cosmology: typeof proposal.cosmology === 'string' ? proposal.cosmology : 'own',
  };
}

function toPatch(values: SettingsForm): ProposalPatch {
  return {
    title: values.title,
    abstract: values.abstract,
    keywords: values.keywords
      .split(',')
      .map((word) => word.trim())
      .filter((word) => word !== ''),
    panelId: values.panelId || null,
    partnerId: values.partnerId || null,
    ...(values.cosmology === 'own' ? {} : { cosmology: values.cosmology }),
  };
}
