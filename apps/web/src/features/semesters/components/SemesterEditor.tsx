import { Semester, type SemesterInput } from '@faintward/contracts/semesters';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useEffect, useState } from 'react';
import { useWatch, type FieldPath } from 'react-hook-form';
import { ApiError } from '../../../lib/api';
import { formatInstant } from '../../../lib/time';
import { ChangedMeanwhileDialog } from '../../../ui/ChangedMeanwhileDialog';
import { Panel } from '../../../ui/Panel';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { InstantField } from '../../../ui/form/DateFields';
import { LeaveGuard } from '../../../ui/form/LeaveGuard';
import { CheckboxField, TextField } from '../../../ui/form/fields';
import { showServerErrors, useZodForm } from '../../../ui/form/useZodForm';
import { useSaveSemester } from '../api/semesters';
import {
  emptyForm,
  fieldWords,
  isSame,
  nameFromDates,
  patchOf,
  SemesterForm,
  toForm,
  withCriterionIds,
  type SemesterFormInput,
} from '../semesterForm';
import { CriteriaEditor } from './CriteriaEditor';
import { HoursEditor } from './HoursEditor';

export interface SemesterEditorProps {
  /** The one to change; without it a new one is set up, beginning with what `newest` asked for. */
  semester?: Semester | undefined;
  newest?: Semester | undefined;
  telescopes: readonly { telescopeId: string; name: string; siteTimeZone: string }[];
  onSaved: (semester: Semester, message: string) => void;
  onCancel: () => void;
}

/** A semester as staff set it up: nights, call, review, criteria and hours. */
export function SemesterEditor({ semester, newest, telescopes, onSaved, onCancel }: SemesterEditorProps) {
  // What was loaded stays what changes are measured against, even when the list is fetched again behind the form.
  const [base, setBase] = useState(semester);
  const [theirs, setTheirs] = useState<{ current: Semester; mine: SemesterInput }>();
  const { create, change } = useSaveSemester();
  const form = useZodForm(SemesterForm, { defaultValues: base ? toForm(base) : emptyForm(newest) });
  const siteTimeZone = base?.siteTimeZone ?? telescopes[0]?.siteTimeZone ?? 'UTC';
  const saving = create.isPending || change.isPending;
  const error = create.error ?? change.error;
  const [problem, setProblem] = useState<unknown>();
  const [saved, setSaved] = useState<{ semester: Semester; message: string }>();
  useNameOfDates(form, base === undefined);

  const fail = (failure: unknown) => {
    const values = form.getValues();
    setProblem(showServerErrors(form, failure, fieldPaths(values)) ? undefined : failure);
  };

  const save = async (input: SemesterInput) => {
    setProblem(undefined);
    const values = { ...input, criteria: withCriterionIds(input.criteria, base?.criteria ?? []) };
    try {
      if (!base) {
        onSavedNow(await create.mutateAsync(values), `${values.name} is set up.`);
        return;
      }
      await saveChange(base, values);
    } catch (failure) {
      fail(failure);
    }
  };

  async function saveChange(from: Semester, values: SemesterInput) {
    const patch = patchOf(toForm(from), values);
    try {
      const stored = await change.mutateAsync({ semesterId: from.semesterId, version: from.version, patch });
      onSavedNow(stored, 'Saved.');
    } catch (failure) {
      const current = staleVersionIn(failure);
      if (!current) throw failure;
      const now = toForm(current);
      const disputed = Object.keys(patch).some((key) => {
        const name = key as keyof SemesterInput;
        return !isSame(toForm(from)[name], now[name]) && !isSame(values[name], now[name]);
      });
      if (disputed) {
        setTheirs({ current, mine: values });
        return;
      }
      // A colleague changed other fields: both changes stand.
      const stored = await change.mutateAsync({ semesterId: current.semesterId, version: current.version, patch });
      onSavedNow(stored, 'Saved, beside what a colleague changed meanwhile.');
    }
  }

  function onSavedNow(semester: Semester, message: string) {
    setTheirs(undefined);
    setSaved({ semester, message });
  }
  // Only once nothing guards the page any more.
  useEffect(() => {
    if (saved) onSaved(saved.semester, saved.message);
    // eslint-disable-next-line react-hooks/exhaustive-deps -- told once for one save, whatever the callback has become
  }, [saved]);

  const submit = form.handleSubmit(save);
  return (
    <form onSubmit={(event) => void submit(event)} noValidate>
      <LeaveGuard when={form.formState.isDirty && !saved} />
      <Stack component="fieldset" disabled={saving} sx={{ border: 0, p: 0, m: 0, minWidth: 0, gap: 2.25 }}>
        <Panel title="Nights" note="A night is named by the local date of its evening.">
          <Box sx={columns}>
            <TextField control={form.control} name="startsOn" label={fieldWords.startsOn} helperText="as 2027-10-01" />
            <TextField control={form.control} name="endsOn" label={fieldWords.endsOn} helperText="as 2028-03-31" />
            <TextField
              control={form.control}
              name="name"
              label={fieldWords.name}
              helperText="by its months; everybody sees it"
            />
          </Box>
        </Panel>
        <Panel title="Call">
          <Stack sx={{ gap: 2 }}>
            <Box sx={columns}>
              <InstantField
                control={form.control}
                name="callOpensAt"
                label={fieldWords.callOpensAt}
                siteTimeZone={siteTimeZone}
              />
              <InstantField
                control={form.control}
                name="deadlineAt"
                label={fieldWords.deadlineAt}
                siteTimeZone={siteTimeZone}
              />
            </Box>
            <TextField
              control={form.control}
              name="callText"
              label={fieldWords.callText}
              helperText="The front page shows it. Blank lines part paragraphs; lines that begin with “- ” become a list."
              multiline
              minRows={5}
              maxRows={20}
              fullWidth
            />
          </Stack>
        </Panel>
        <Panel
          title="Hours to share out"
          note="In each kind of night, after engineering time and the usual weather loss."
        >
          <HoursEditor form={form} telescopes={telescopes} />
        </Panel>
        <Panel title="Review">
          <Box sx={columns}>
            <InstantField
              control={form.control}
              name="reviewsDueAt"
              label={fieldWords.reviewsDueAt}
              siteTimeZone={siteTimeZone}
              helperText="May stay empty; nothing closes by itself."
            />
            <Box sx={{ gridColumn: { md: 'span 2' } }}>
              <CheckboxField
                control={form.control}
                name="isAnonymised"
                label="Reviewers see no names, institutions or team sizes until the ranking is final"
              />
              {form.formState.errors.isAnonymised && (
                <Typography variant="body2" color="error" role="alert">
                  {form.formState.errors.isAnonymised.message}
                </Typography>
              )}
            </Box>
          </Box>
        </Panel>
        <Panel
          title="Criteria"
          note="Every review scores each of them from 0 to 10. They are fixed once the first review has begun."
        >
          <CriteriaEditor form={form} />
        </Panel>
        {problem !== undefined && <ProblemDisplay error={problem} what="Not saved" />}
        {error !== null && problem === undefined && form.formState.isSubmitted && !form.formState.isValid && (
          <Typography color="error">Not saved: see the fields above.</Typography>
        )}
        <Stack direction="row" sx={{ gap: 1.25 }}>
          <Button
            type="submit"
            variant="contained"
            loading={saving}
            disabled={base !== undefined && !form.formState.isDirty}
          >
            {base ? 'Save' : 'Set up the semester'}
          </Button>
          <Button onClick={onCancel}>Cancel</Button>
        </Stack>
      </Stack>
      {theirs && (
        <ChangedMeanwhileDialog
          open
          what={theirs.current.name}
          rows={differingRows(theirs.mine, toForm(theirs.current), siteTimeZone)}
          note="Storing yours replaces these fields; whatever else your colleague changed stays."
          pending={saving}
          onLater={() => setTheirs(undefined)}
          onTheirs={() => {
            setBase(theirs.current);
            form.reset(toForm(theirs.current));
            setTheirs(undefined);
          }}
          onMine={() => {
            const { current, mine } = theirs;
            const patch = base ? patchOf(toForm(base), mine) : {};
            change.mutateAsync({ semesterId: current.semesterId, version: current.version, patch }).then(
              (stored) => onSavedNow(stored, 'Saved.'),
              (failure: unknown) => {
                setTheirs(undefined);
                fail(failure);
              },
            );
          }}
        />
      )}
    </form>
  );
}

const columns = {
  display: 'grid',
  gridTemplateColumns: { xs: 'minmax(0, 1fr)', md: 'repeat(3, minmax(0, 1fr))' },
  gap: 2,
  alignItems: 'start',
} as const;

/** Until somebody types a name, the months name the semester. */
function useNameOfDates(form: ReturnType<typeof useZodForm<SemesterFormInput, SemesterInput>>, isNew: boolean) {
  const startsOn = useWatch({ control: form.control, name: 'startsOn' });
  const endsOn = useWatch({ control: form.control, name: 'endsOn' });
  const { getFieldState, setValue } = form;
  useEffect(() => {
    const name = nameFromDates(startsOn, endsOn);
    if (isNew && name && !getFieldState('name').isTouched) setValue('name', name, { shouldDirty: true });
  }, [startsOn, endsOn, isNew, getFieldState, setValue]);
}

function staleVersionIn(error: unknown): Semester | undefined {
  if (!(error instanceof ApiError) || error.code !== 'stale-version') return undefined;
  const current = Semester.safeParse(error.current);
  return current.success ? current.data : undefined;
}

/** Every field that the server can blame, as the form names it. */
function fieldPaths(values: SemesterFormInput): FieldPath<SemesterFormInput>[] {
  return [
    ...values.criteria.flatMap((_criterion, index) => [
      `criteria.${index}.title` as const,
      `criteria.${index}.weight` as const,
      `criteria.${index}.anchors.low` as const,
      `criteria.${index}.anchors.middle` as const,
      `criteria.${index}.anchors.high` as const,
    ]),
    ...values.telescopes.flatMap((_telescope, index) => [
      `telescopes.${index}.availableHours.dark` as const,
      `telescopes.${index}.availableHours.grey` as const,
      `telescopes.${index}.availableHours.bright` as const,
    ]),
    ...(Object.keys(fieldWords) as (keyof SemesterInput)[]),
  ];
}

function differingRows(mine: SemesterInput, theirs: SemesterInput, siteTimeZone: string) {
  return (Object.keys(fieldWords) as (keyof SemesterInput)[])
    .filter((key) => !isSame(mine[key] ?? null, theirs[key] ?? null))
    .map((key) => ({
      label: fieldWords[key],
      mine: describe(key, mine, siteTimeZone),
      theirs: describe(key, theirs, siteTimeZone),
    }));
}

function describe(key: keyof SemesterInput, values: SemesterInput, siteTimeZone: string): string {
  switch (key) {
    case 'criteria':
      return values.criteria.map(({ title, weight }) => `${title}, weight ${weight}`).join('; ');
    case 'telescopes':
      return values.telescopes
        .map(({ availableHours: { dark, grey, bright } }) => `${dark} / ${grey} / ${bright} h`)
        .join('; ');
    case 'isAnonymised':
      return values.isAnonymised ? 'hidden from reviewers' : 'shown to reviewers';
    case 'callOpensAt':
    case 'deadlineAt':
    case 'reviewsDueAt': {
      const instant = values[key];
      if (!instant) return 'none';
      const date = new Date(instant);
      return `${formatInstant(date, 'UTC')} UTC, ${formatInstant(date, siteTimeZone)} site`;
    }
    case 'name':
    case 'startsOn':
    case 'endsOn':
    case 'callText':
      return values[key] || '—';
  }
}
