import type { DemoPerson } from '@faintward/contracts/accounts';
import Box from '@mui/material/Box';
import ButtonBase from '@mui/material/ButtonBase';

/** The people of the demo scenario, each one click away, with what to look at as them. */
export function DemoPeopleList({
  people,
  pendingEmail,
  onChoose,
}: {
  people: readonly DemoPerson[];
  pendingEmail: string | undefined;
  onChoose: (email: string) => void;
}) {
  return (
    <Box component="ul" sx={{ listStyle: 'none', p: 0, m: 0 }}>
      {people.map((person) => (
        <Box
          component="li"
          key={person.email}
          sx={{ borderBottom: 1, borderColor: 'divider', '&:last-child': { border: 0 } }}
        >
          <ButtonBase
            disabled={pendingEmail !== undefined}
            aria-busy={pendingEmail === person.email}
            onClick={() => onChoose(person.email)}
            sx={{
              width: '100%',
              display: 'grid',
              gridTemplateColumns: { xs: '1fr', sm: '200px 1fr' },
              columnGap: 2,
              textAlign: 'left',
              alignItems: 'baseline',
              py: 1.1,
              px: 1,
              font: 'inherit',
              '&:hover': { bgcolor: 'action.hover' },
              '&.Mui-disabled': { opacity: pendingEmail === person.email ? 1 : 0.6 },
            }}
          >
            <Box component="span">
              <Box component="strong" sx={{ fontWeight: 600, color: 'primary.main' }}>
                {person.name}
              </Box>
              {person.institutionName && (
                <Box component="small" sx={{ display: 'block', color: 'text.secondary', fontSize: '0.8125rem' }}>
                  {person.institutionName}
                </Box>
              )}
            </Box>
            <span>{pendingEmail === person.email ? 'Signing in…' : person.part}</span>
          </ButtonBase>
        </Box>
      ))}
    </Box>
  );
}
