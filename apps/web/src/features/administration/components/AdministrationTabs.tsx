import Box from '@mui/material/Box';
import { NavLink } from 'react-router-dom';
import { paths } from '../../../app/paths';
import { colour } from '../../../theme/theme';

const pages = [
  { label: 'People and roles', to: paths.administrationPeople.to() },
  { label: 'Outgoing mail', to: paths.administrationMail.to() },
  { label: 'Audit trail', to: paths.administrationChanges.to() },
];

/** The pages of the administration, as links: each has its own address. */
export function AdministrationTabs() {
  return (
    <Box
      component="nav"
      aria-label="Administration"
      sx={{ display: 'flex', overflowX: 'auto', gap: 3, mb: 2.5, borderBottom: 1, borderColor: 'divider' }}
    >
      {pages.map((page) => (
        <Box
          key={page.to}
          component={NavLink}
          to={page.to}
          sx={{
            py: 1.5,
            color: 'text.secondary',
            textDecoration: 'none',
            whiteSpace: 'nowrap',
            '&:hover': { color: 'text.primary' },
            '&:focus-visible': { outlineOffset: -3 },
            '&[aria-current]': { color: 'text.primary', fontWeight: 600, boxShadow: `inset 0 -2px 0 ${colour.accent}` },
          }}
        >
          {page.label}
        </Box>
      ))}
    </Box>
  );
}
