import type { NewTeamMember } from '@faintward/contracts/proposals';
import { TeamAccess } from '@faintward/contracts/permissions';
import type { PersonSummary } from '@faintward/contracts/people';
import Autocomplete from '@mui/material/Autocomplete';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import MenuItem from '@mui/material/MenuItem';
import TextField from '@mui/material/TextField';
import { useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { Panel } from '../../../ui/Panel';
import { ProblemDisplay } from '../../../ui/ProblemDisplay';
import { peopleQueries } from '../api/proposals';
import { accessWords } from './words';

interface AddMutation {
  mutate: (input: NewTeamMember, options: { onSuccess: () => void }) => void;
  isPending: boolean;
  error: Error | null;
}

/** Finds a person by name and adds them with the access chosen. */
export function AddMember({ add, present }: { add: AddMutation; present: readonly string[] }) {
  const [text, setText] = useState('');
  const [search, setSearch] = useState('');
  const [person, setPerson] = useState<PersonSummary | null>(null);
  const [access, setAccess] = useState<TeamAccess>('editsTargets');
  useEffect(() => {
    const timer = setTimeout(() => setSearch(text), 250);
    return () => clearTimeout(timer);
  }, [text]);
  const found = useQuery(peopleQueries.search(search));
  const options = (found.data?.rows ?? []).filter((row) => !present.includes(row.personId));
  return (
    <Panel title="Add a person" note="They find the proposal in their list at once.">
      <Box
        component="form"
        onSubmit={(event) => {
          event.preventDefault();
          if (!person) return;
          add.mutate({ personId: person.personId, access }, { onSuccess: () => setPerson(null) });
        }}
        sx={{
          display: 'grid',
          gridTemplateColumns: { xs: '1fr', md: '1fr 220px auto' },
          gap: 1.5,
          alignItems: 'start',
        }}
      >
        <Autocomplete
          options={options}
          value={person}
          onChange={(_event, next) => setPerson(next)}
          inputValue={text}
          onInputChange={(_event, next) => setText(next)}
          loading={found.isFetching}
          filterOptions={(all) => all}
          getOptionLabel={(option) => option.name}
          getOptionKey={(option) => option.personId}
          isOptionEqualToValue={(one, other) => one.personId === other.personId}
          noOptionsText={
            search.trim().length < 2 ? 'Type at least two letters of the name' : 'Nobody of this name has an account'
          }
          renderOption={({ key, ...props }, option) => (
            <li key={key} {...props}>
              <span>
                {option.name}
                <Box component="span" sx={{ color: 'text.secondary' }}>
                  {option.institutionName ? `, ${option.institutionName}` : ''}
                </Box>
              </span>
            </li>
          )}
          renderInput={(params) => <TextField {...params} label="Name" />}
        />
        <TextField
          select
          label="Access"
          value={access}
          onChange={(event) => setAccess(TeamAccess.parse(event.target.value))}
        >
          {TeamAccess.options.map((option) => (
            <MenuItem key={option} value={option}>
              {accessWords[option]}
            </MenuItem>
          ))}
        </TextField>
        <Button type="submit" variant="contained" disabled={!person} loading={add.isPending}>
          Add to the team
        </Button>
      </Box>
      {add.error && <ProblemDisplay error={add.error} what="Not added" />}
      {found.error && <ProblemDisplay error={found.error} what="People could not be searched" />}
    </Panel>
  );
}
