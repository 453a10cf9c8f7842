import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import type { SemesterInput } from '@faintward/contracts/semesters';
import { useFieldArray, useWatch, type UseFormReturn } from 'react-hook-form';
import { formatNumber } from '../../../lib/format';
import { Note } from '../../../ui/Note';
import { NumberField, TextField } from '../../../ui/form/fields';
import { newCriterion, type SemesterFormInput } from '../semesterForm';

/** The criteria, in the order of the review form: title, weight, and what the ends and the middle of the scale mean. */
export function CriteriaEditor({ form }: { form: UseFormReturn<SemesterFormInput, unknown, SemesterInput> }) {
  const { fields, append, remove, move } = useFieldArray({ control: form.control, name: 'criteria' });
  const criteria = useWatch({ control: form.control, name: 'criteria' });
  const total = criteria.reduce((sum, { weight }) => sum + (typeof weight === 'number' ? weight : 0), 0);
  const error = form.formState.errors.criteria;
  const message = error?.root?.message ?? error?.message;
  return (
    <Stack sx={{ gap: 2 }}>
      {message && (
        <Note tone="error" live>
          {message}
        </Note>
      )}
      {fields.map((field, index) => {
        const weight = criteria[index]?.weight;
        const share = typeof weight === 'number' && weight > 0 && total > 0 ? (100 * weight) / total : undefined;
        const name = criteria[index]?.title || `criterion ${index + 1}`;
        return (
          <Box
            component="fieldset"
            key={field.id}
            sx={{ border: 0, borderTop: 1, borderColor: 'divider', p: 0, pt: 2, m: 0, minWidth: 0 }}
          >
            <Typography component="legend" variant="body2" color="textSecondary" sx={{ float: 'left', width: '100%' }}>
              {index + 1}. criterion
            </Typography>
            <Box
              sx={{
                clear: 'both',
                pt: 1.5,
                display: 'grid',
                gridTemplateColumns: { xs: 'minmax(0, 1fr)', md: 'minmax(0, 1fr) 150px auto' },
                gap: 1.5,
                alignItems: 'start',
              }}
            >
              <TextField control={form.control} name={`criteria.${index}.title`} label="Title" fullWidth />
              <NumberField
                control={form.control}
                name={`criteria.${index}.weight`}
                label="Weight"
                helperText={share === undefined ? ' ' : `${formatNumber(share, { decimals: 0 })} % of the score`}
              />
              <Stack direction="row" sx={{ gap: 0.5 }}>
                <Button
                  size="small"
                  disabled={index === 0}
                  aria-label={`Move ${name} up`}
                  onClick={() => move(index, index - 1)}
                >
                  Up
                </Button>
                <Button
                  size="small"
                  disabled={index === fields.length - 1}
                  aria-label={`Move ${name} down`}
                  onClick={() => move(index, index + 1)}
                >
                  Down
                </Button>
                <Button
                  size="small"
                  disabled={fields.length === 1}
                  aria-label={`Remove ${name}`}
                  onClick={() => remove(index)}
                >
                  Remove
                </Button>
              </Stack>
            </Box>
            <Box
              sx={{
                pt: 2,
                display: 'grid',
                gridTemplateColumns: { xs: 'minmax(0, 1fr)', md: 'repeat(3, minmax(0, 1fr))' },
                gap: 1.5,
              }}
            >
              {(
                [
                  ['low', 'What 0 means'],
                  ['middle', 'What 5 means'],
                  ['high', 'What 10 means'],
                ] as const
              ).map(([anchor, label]) => (
                <TextField
                  key={anchor}
                  control={form.control}
                  name={`criteria.${index}.anchors.${anchor}`}
                  label={label}
                  multiline
                  minRows={2}
                  fullWidth
                />
              ))}
            </Box>
          </Box>
        );
      })}
      <div>
        <Button disabled={fields.length >= 12} onClick={() => append(newCriterion())}>
          Add a criterion
        </Button>
      </div>
    </Stack>
  );
}
