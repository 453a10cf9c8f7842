import { AwardInput, AwardStanding, type RankingRow } from '@faintward/contracts/reviews';
import { MoonClass } from '@faintward/contracts/semesters';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Dialog from '@mui/material/Dialog';
import DialogActions from '@mui/material/DialogActions';
import DialogContent from '@mui/material/DialogContent';
import DialogTitle from '@mui/material/DialogTitle';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useState } from 'react';
import { newIdempotencyKey } from '../../../lib/api';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { NumberField, SelectField, TextField } from '../../../ui/form/fields';
import { showServerErrors, useZodForm } from '../../../ui/form/useZodForm';
import { useAwards } from '../api/panels';
import { hoursText } from './RankingCells';

const standingHints: Record<AwardStanding, string> = {
  firm: 'firm: planned first',
  flexible: 'flexible: planned as conditions allow',
  filler: 'filler: only when nothing else fits',
};

/** Decides on one proposal: hours, moon class, standing, reason. Zero hours is a decision too. */
export function AwardDialog({ panelId, row, onClose }: { panelId: string; row: RankingRow; onClose: () => void }) {
  const { put, remove } = useAwards(panelId);
  const [key] = useState(newIdempotencyKey);
  const form = useZodForm(AwardInput, {
    defaultValues: row.award ?? {
      hours: Math.round(row.requestedTotalHours * 10) / 10,
      moonClass: mostAskedClass(row),
      standing: 'firm',
      reason: '',
    },
  });
  const submit = form.handleSubmit(async (input) => {
    const done = await put
      .mutateAsync({ proposalId: row.proposalId, version: row.award?.version, input, idempotencyKey: key })
      .catch((error: unknown) => void showServerErrors(form, error, ['hours', 'moonClass', 'standing', 'reason']));
    if (done) onClose();
  });
  return (
    <Dialog open onClose={onClose} aria-labelledby="award-title" maxWidth="sm" fullWidth>
      <form onSubmit={(event) => void submit(event)} noValidate>
        <DialogTitle id="award-title">Award for {row.label}</DialogTitle>
        <DialogContent>
          <Typography sx={{ mb: 2 }}>
            {row.title}
            <Typography component="span" color="textSecondary" sx={{ display: 'block' }}>
              asked for {hoursText(row.requestedHours, ' h')}
            </Typography>
          </Typography>
          <Stack
            component="fieldset"
            disabled={put.isPending || remove.isPending}
            sx={{ border: 0, p: 0, m: 0, gap: 2 }}
          >
            <Box sx={{ display: 'grid', gridTemplateColumns: { xs: '1fr', sm: '1fr 1fr 1fr' }, gap: 2 }}>
              <NumberField
                control={form.control}
                name="hours"
                label="Hours"
                unit="h"
                helperText="0 declines the proposal"
                autoFocus
              />
              <SelectField
                control={form.control}
                name="moonClass"
                label="Moon class"
                options={MoonClass.options.map((value) => ({ value, label: value }))}
              />
              <SelectField
                control={form.control}
                name="standing"
                label="Standing"
                options={AwardStanding.options.map((value) => ({ value, label: value }))}
              />
            </Box>
            <Typography variant="body2" color="textSecondary">
              {AwardStanding.options.map((standing) => standingHints[standing]).join(' · ')}
            </Typography>
            <TextField
              control={form.control}
              name="reason"
              label="Reason for the team"
              helperText="Stands in the decision that the principal investigator reads."
              multiline
              minRows={3}
              maxRows={12}
              fullWidth
            />
            {(put.error ?? remove.error) && <ProblemDisplay error={put.error ?? remove.error} what="Not decided" />}
          </Stack>
        </DialogContent>
        <DialogActions sx={{ px: 3, pb: 2 }}>
          {row.award && (
            <Button
              variant="text"
              sx={{ mr: 'auto' }}
              loading={remove.isPending}
              onClick={() =>
                row.award &&
                remove.mutate({ proposalId: row.proposalId, version: row.award.version }, { onSuccess: onClose })
              }
            >
              Take the decision back
            </Button>
          )}
          <Button onClick={onClose}>Cancel</Button>
          <Button type="submit" variant="contained" loading={put.isPending}>
            Decide
          </Button>
        </DialogActions>
      </form>
    </Dialog>
  );
}

function mostAskedClass(row: RankingRow): MoonClass {
  return MoonClass.options.reduce((most, moonClass) =>
    row.requestedHours[moonClass] > row.requestedHours[most] ? moonClass : most,
  );
}
