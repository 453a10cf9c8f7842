import type { SemesterInput } from '@faintward/contracts/semesters';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useFieldArray, useWatch, type UseFormReturn } from 'react-hook-form';
import { formatNumber } from '../../../lib/format';
import { Note } from '../../../ui/Note';
import { NumberField } from '../../../ui/form/fields';
import type { SemesterFormInput } from '../semesterForm';

const moonClasses = ['dark', 'grey', 'bright'] as const;

/** The hours to share out, telescope by telescope and moon class by moon class. */
export function HoursEditor({
  form,
  telescopes,
}: {
  form: UseFormReturn<SemesterFormInput, unknown, SemesterInput>;
  telescopes: readonly { telescopeId: string; name: string }[];
}) {
  const { fields, append, remove } = useFieldArray({ control: form.control, name: 'telescopes' });
  const values = useWatch({ control: form.control, name: 'telescopes' });
  const error = form.formState.errors.telescopes;
  const message = error?.root?.message ?? error?.message;
  const nameOf = (telescopeId: string) =>
    telescopes.find((telescope) => telescope.telescopeId === telescopeId)?.name ?? 'A telescope that is gone';
  const others = telescopes.filter(({ telescopeId }) => !values.some((row) => row.telescopeId === telescopeId));
  return (
    <Stack sx={{ gap: 2 }}>
      {message && (
        <Note tone="error" live>
          {message}
        </Note>
      )}
      {fields.length === 0 && (
        <Typography color="textSecondary">No telescope is shared out yet: nobody can ask for time.</Typography>
      )}
      {fields.map((field, index) => {
        const hours = values[index]?.availableHours;
        const total = moonClasses.reduce(
          (sum, moon) => sum + (typeof hours?.[moon] === 'number' ? (hours[moon] as number) : Number.NaN),
          0,
        );
        const name = nameOf(field.telescopeId);
        return (
          <Box
            role="group"
            aria-label={name}
            key={field.id}
            sx={{
              minWidth: 0,
              display: 'grid',
              gridTemplateColumns: {
                xs: 'repeat(3, minmax(0, 1fr))',
                md: 'minmax(0, 1fr) repeat(3, 130px) 110px auto',
              },
              gap: 1.5,
              alignItems: 'center',
            }}
          >
            <Typography aria-hidden="true" sx={{ fontWeight: 600, gridColumn: { xs: '1 / -1', md: 'auto' } }}>
              {name}
            </Typography>
            {moonClasses.map((moon) => (
              <NumberField
                key={moon}
                control={form.control}
                name={`telescopes.${index}.availableHours.${moon}`}
                label={moon}
                unit="h"
              />
            ))}
            <Typography
              variant="body2"
              color="textSecondary"
              sx={{ textAlign: { md: 'right' }, gridColumn: { xs: '1 / 3', md: 'auto' } }}
            >
              {formatNumber(total, { decimals: 0 })} h in all
            </Typography>
            <Button size="small" aria-label={`Remove ${name}`} onClick={() => remove(index)}>
              Remove
            </Button>
          </Box>
        );
      })}
      {others.length > 0 && (
        <Stack direction="row" sx={{ gap: 1, flexWrap: 'wrap' }}>
          {others.map(({ telescopeId, name }) => (
            <Button
              key={telescopeId}
              onClick={() => append({ telescopeId, availableHours: { dark: 0, grey: 0, bright: 0 } })}
            >
              Share out {name}
            </Button>
          ))}
        </Stack>
      )}
    </Stack>
  );
}
