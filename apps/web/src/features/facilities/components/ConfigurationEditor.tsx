import type { Mode, NewModeConfiguration } from '@faintward/contracts/facilities';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Stack from '@mui/material/Stack';
import Typography from '@mui/material/Typography';
import { useEffect, useState } from 'react';
import { useWatch } from 'react-hook-form';
import { ComparisonTable } from '../../../ui/ComparisonTable';
import { ConfirmDialog } from '../../../ui/ConfirmDialog';
import { Note } from '../../../ui/Note';
import { Panel } from '../../../ui/Panel';
import { problemMessage } from '../../../ui/ProblemDisplay';
import { LeaveGuard } from '../../../ui/form/LeaveGuard';
import { NumberField, SelectField, TextField } from '../../../ui/form/fields';
import { showServerErrors, useZodForm } from '../../../ui/form/useZodForm';
import { useAddConfiguration } from '../api/facilities';
import {
  ConfigurationForm,
  configurationGroups,
  differencesOf,
  skySubtractionWords,
  toForm,
  type ConfigurationFormValues,
} from '../configurationFields';

export interface ConfigurationEditorProps {
  mode: Mode;
  /** The mode as it is stored now: somebody else may have put another version in force since the form was opened. */
  readCurrent: () => Promise<Mode | undefined>;
  onSaved: (version: number) => void;
  onCancel: () => void;
}

interface Asking {
  input: NewModeConfiguration;
  current: Mode;
}

/** A new version of a mode's configuration, beginning with the one in force. Its differences are shown before it is stored. */
export function ConfigurationEditor({ mode, readCurrent, onSaved, onCancel }: ConfigurationEditorProps) {
  const [base] = useState(mode);
  const form = useZodForm<ConfigurationFormValues, NewModeConfiguration>(ConfigurationForm, {
    defaultValues: toForm(base.configuration),
  });
  const add = useAddConfiguration(base.modeId);
  const [asking, setAsking] = useState<Asking>();
  const [savedVersion, setSavedVersion] = useState<number>();
  const [problem, setProblem] = useState<string>();
  const subtraction: unknown = useWatch({ control: form.control, name: 'configuration.skySubtraction.kind' });
  const groups = configurationGroups(base.configuration.kind);
  const names = [
    ...groups.flatMap((group) => group.fields.map((field) => `configuration.${field.path}`)),
    'configuration.skySubtraction.kind',
    'configuration.skySubtraction.backgroundPixelRatio',
    'note',
  ];

  // Only once nothing guards the page any more.
  useEffect(() => {
    if (savedVersion !== undefined) onSaved(savedVersion);
    // eslint-disable-next-line react-hooks/exhaustive-deps -- told once for one save, whatever the callback has become
  }, [savedVersion]);

  const review = form.handleSubmit(async (input) => {
    setProblem(undefined);
    try {
      const current = (await readCurrent()) ?? base;
      if (differencesOf(current.configuration, input.configuration).length === 0) {
        setProblem('Nothing differs from the configuration in force.');
        return;
      }
      add.reset();
      setAsking({ input, current });
    } catch (error) {
      setProblem(`The configuration in force could not be read. ${problemMessage(error)}`);
    }
  });

  const store = ({ input }: Asking) =>
    add.mutate(input, {
      onSuccess: (stored) => {
        setAsking(undefined);
        setSavedVersion(stored.version);
      },
      onError: (error) => {
        if (showServerErrors(form, error, names)) setAsking(undefined);
      },
    });

  return (
    <form onSubmit={(event) => void review(event)} noValidate>
      <LeaveGuard when={form.formState.isDirty && savedVersion === undefined} what="The new configuration" />
      <Stack sx={{ gap: 2.25 }}>
        {groups.map((group) => (
          <Panel key={group.title} title={group.title}>
            <Box sx={columns}>
              {group.fields.map((field) =>
                field.isText ? (
                  <TextField
                    key={field.path}
                    control={form.control}
                    name={`configuration.${field.path}`}
                    label={field.label}
                    helperText={field.hint}
                  />
                ) : (
                  <NumberField
                    key={field.path}
                    control={form.control}
                    name={`configuration.${field.path}`}
                    label={field.label}
                    unit={field.unit}
                    helperText={field.hint}
                  />
                ),
              )}
              {group.title === 'Exposures' && (
                <>
                  <SelectField
                    control={form.control}
                    name="configuration.skySubtraction.kind"
                    label="Sky subtraction"
                    options={Object.entries(skySubtractionWords).map(([value, label]) => ({ value, label }))}
                  />
                  {subtraction === 'annulus' && (
                    <NumberField
                      control={form.control}
                      name="configuration.skySubtraction.backgroundPixelRatio"
                      label="Pixels of the annulus"
                      helperText="per pixel of the aperture"
                    />
                  )}
                </>
              )}
            </Box>
          </Panel>
        ))}
        <Panel title="What changed, and why">
          <TextField
            control={form.control}
            name="note"
            label="Note"
            helperText="Kept with the version, such as the measurement that it rests on."
            multiline
            minRows={2}
            fullWidth
          />
        </Panel>
        {problem && (
          <Note tone="warning" live>
            {problem}
          </Note>
        )}
        <Stack direction="row" sx={{ gap: 1.25 }}>
          <Button type="submit" variant="contained" loading={form.formState.isSubmitting}>
            Review the differences
          </Button>
          <Button onClick={onCancel}>Cancel</Button>
        </Stack>
      </Stack>
      {asking && (
        <ConfirmDialog
          open
          title={`Put a new configuration of ${base.name} in force?`}
          confirmLabel="Put in force"
          pending={add.isPending}
          error={add.error}
          onCancel={() => setAsking(undefined)}
          onConfirm={() => store(asking)}
        >
          {asking.current.configurationVersion !== base.configurationVersion && (
            <Box sx={{ mb: 1.5 }}>
              <Note tone="warning" live>
                Configuration {asking.current.configurationVersion} was put in force while you were writing. What is
                shown below differs from it.
              </Note>
            </Box>
          )}
          <ComparisonTable
            secondStands
            heads={[
              `Configuration ${asking.current.configurationVersion}`,
              `Configuration ${asking.current.configurationVersion + 1}`,
            ]}
            rows={differencesOf(asking.current.configuration, asking.input.configuration).map(
              ({ label, before, after }) => ({ label, values: [before, after] }),
            )}
          />
          <Typography variant="body2" color="textSecondary" sx={{ mt: 1.5 }}>
            From now on estimates use it. What was computed or submitted before names the version that it used, and that
            version stays.
          </Typography>
        </ConfirmDialog>
      )}
    </form>
  );
}

const columns = {
  display: 'grid',
  gridTemplateColumns: { xs: 'minmax(0, 1fr)', sm: 'repeat(2, minmax(0, 1fr))', lg: 'repeat(4, minmax(0, 1fr))' },
  gap: 2,
  alignItems: 'start',
} as const;
