import type { Target } from '@faintward/contracts/targets';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { ChangedMeanwhileDialog } from '../../../ui/ChangedMeanwhileDialog';
import { LeaveGuard } from '../../../ui/form/LeaveGuard';
import { SaveStatus } from '../../../ui/form/SaveStatus';
import { FieldGroup } from '../../../ui/light/DraftFields';
import { LightFields } from '../../../ui/light/LightFields';
import { describeExtent, describeLight, describeUncertainty } from '../../../ui/light/lightWords';
import { RedshiftFields } from '../../../ui/light/RedshiftFields';
import { readLightDraft } from '../../../ui/light/readLightDraft';
import { readRedshiftDraft } from '../../../ui/light/redshiftDraft';
import { useSourceForm } from '../hooks/useSourceForm';

/** Describes one target's redshift, light and size; saves by itself. */
export function SourceForm({ proposalId, target, canEdit }: { proposalId: string; target: Target; canEdit: boolean }) {
  const form = useSourceForm(proposalId, target);
  const { draft, conflict } = form;
  const redshift = readRedshiftDraft(draft.redshift);
  return (
    <Box
      component="form"
      noValidate
      aria-label="Redshift, light and size"
      onSubmit={(event) => {
        event.preventDefault();
        void form.flush();
      }}
      // Leaving a field is the moment when something is meant to stand. What failed is not sent again by it: a dialog
      // that opens takes the focus too.
      onBlur={() => {
        if (form.saveState.kind === 'waiting' && form.isComplete) void form.flush();
      }}
    >
      <LeaveGuard when={form.hasUnsaved} what="Redshift, light and size" />
      <Stack sx={{ gap: 2.5 }}>
        <FieldGroup title="Redshift">
          <RedshiftFields
            draft={draft.redshift}
            errors={form.redshiftErrors}
            disabled={!canEdit}
            onChange={form.changeRedshift}
          />
        </FieldGroup>
        <LightFields
          draft={draft.light}
          errors={form.lightErrors}
          disabled={!canEdit}
          redshift={redshift.ok ? redshift.redshift : target.redshift}
          proposalId={proposalId}
          onChange={form.changeLight}
        />
        {canEdit && (
          <Stack direction="row" sx={{ gap: 2, alignItems: 'center', flexWrap: 'wrap', minHeight: 32 }}>
            <Typography variant="body2" color="textSecondary" component="div" sx={{ flex: '1 1 200px' }}>
              {form.isComplete ? (
                <SaveStatus state={form.saveState} onRetry={form.retry} />
              ) : (
                <span role="status">not saved while something is lacking or cannot be read</span>
              )}
            </Typography>
            {form.canPutBack && (
              <Button size="small" variant="text" onClick={form.putBack}>
                Put back what stood here
              </Button>
            )}
          </Stack>
        )}
      </Stack>
      {conflict && (
        <ChangedMeanwhileDialog
          open
          what={target.name}
          rows={conflictRows(draft, conflict)}
          onMine={form.keepMine}
          onTheirs={form.takeTheirs}
          onLater={form.decideLater}
        />
      )}
    </Box>
  );
}

function conflictRows(draft: ReturnType<typeof useSourceForm>['draft'], theirs: Target) {
  const light = readLightDraft(draft.light);
  const redshift = readRedshiftDraft(draft.redshift);
  const rows = [
    ...(redshift.ok
      ? [
          { label: 'redshift', mine: String(redshift.redshift), theirs: String(theirs.redshift) },
          {
            label: 'its uncertainty',
            mine: describeUncertainty(redshift.uncertainty),
            theirs: describeUncertainty(theirs.redshiftUncertainty),
          },
        ]
      : []),
    ...(light.ok
      ? [
          { label: 'light', mine: describeLight(light.light), theirs: describeLight(theirs.light) },
          { label: 'size', mine: describeExtent(light.extent), theirs: describeExtent(theirs.extent) },
        ]
      : []),
  ];
  const differing = rows.filter((row) => row.mine !== row.theirs);
  return differing.length > 0
    ? differing
    : [{ label: 'details', mine: 'as in this form', theirs: 'name, place, notes or details of the light' }];
}
