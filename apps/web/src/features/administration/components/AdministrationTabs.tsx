import Tab from '@mui/material/Tab';
import Tabs from '@mui/material/Tabs';
import { Link as RouterLink, useLocation } from 'react-router-dom';
import { paths } from '../../../app/paths';

const pages = [
  { label: 'People and roles', to: paths.administrationPeople.to() },
  { label: 'Outgoing mail', to: paths.administrationMail.to() },
  { label: 'Audit trail', to: paths.administrationChanges.to() },
];

/** The pages of the administration, as links: each has its own address. */
export function AdministrationTabs() {
  const { pathname } = useLocation();
  return (
    <nav aria-label="Administration">
      <Tabs
        value={pathname}
        role="none"
        variant="scrollable"
        sx={{ mb: 2.5, borderBottom: 1, borderColor: 'divider' }}
        slotProps={{ list: { role: 'list' } }}
      >
        {pages.map((page) => (
          <Tab
            key={page.to}
            value={page.to}
            label={page.label}
            component={RouterLink}
            to={page.to}
            role="link"
            aria-current={page.to === pathname ? 'page' : undefined}
            aria-selected={undefined}
            tabIndex={0}
          />
        ))}
      </Tabs>
    </nav>
  );
}
