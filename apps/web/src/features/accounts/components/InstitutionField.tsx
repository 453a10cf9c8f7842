import type { Institution } from '@faintward/contracts/people';
import Autocomplete from '@mui/material/Autocomplete';
import MuiTextField from '@mui/material/TextField';

/** Chooses one's institution among those the observatory knows; may stay empty. */
export function InstitutionField({
  institutions,
  value,
  onChange,
  errorMessage,
}: {
  institutions: readonly Institution[];
  value: string | null;
  onChange: (institutionId: string | null) => void;
  errorMessage?: string | undefined;
}) {
  return (
    <Autocomplete
      options={institutions}
      value={institutions.find((one) => one.institutionId === value) ?? null}
      getOptionLabel={(one) => `${one.name}, ${one.country}`}
      getOptionKey={(one) => one.institutionId}
      isOptionEqualToValue={(a, b) => a.institutionId === b.institutionId}
      onChange={(_event, one) => onChange(one?.institutionId ?? null)}
      renderInput={(parameters) => (
        <MuiTextField
          {...parameters}
          label="Institution"
          error={errorMessage !== undefined}
          helperText={errorMessage ?? 'Leave empty if yours is not in the list.'}
        />
      )}
    />
  );
}
