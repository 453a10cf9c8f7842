import MenuIcon from '@mui/icons-material/Menu';
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import Divider from '@mui/material/Divider';
import Drawer from '@mui/material/Drawer';
import IconButton from '@mui/material/IconButton';
import Link from '@mui/material/Link';
import ListItemText from '@mui/material/ListItemText';
import ListSubheader from '@mui/material/ListSubheader';
import Menu from '@mui/material/Menu';
import MenuItem from '@mui/material/MenuItem';
import { useEffect, useRef, useState, type ReactNode } from 'react';
import { Link as RouterLink, NavLink, useLocation } from 'react-router-dom';
import { paths } from '../app/paths';
import { useOnline } from '../lib/useOnline';
import { colour } from '../theme/theme';
import { useThemeChoice, type ThemeChoice } from '../theme/useThemeChoice';
import { Mark } from './Mark';
import { Countdown } from './TimeDisplay';
import { formatInstant } from '../lib/time';
import { Note } from './Note';

export interface ShellSection {
  label: string;
  to: string;
}

export interface AppShellProps {
  sections: readonly ShellSection[];
  /** Undefined when nobody is signed in. */
  person?: { name: string; email: string } | undefined;
  /** Where the person menu leads. */
  personLinks: readonly ShellSection[];
  signInPath: string;
  onSignOut: () => void;
  deadline?: { at: string; siteTimeZone: string } | undefined;
  children: ReactNode;
}

/** The frame around every page: our mark, the sections that concern this person, the deadline, person and theme. */
export function AppShell(props: AppShellProps) {
  const online = useOnline();
  const main = useRef<HTMLElement>(null);
  const { pathname } = useLocation();
  const [firstPath] = useState(pathname);
  useEffect(() => {
    // After a navigation the page starts at its top, and so does a screen reader. Not on the first load.
    if (pathname !== firstPath) main.current?.focus({ preventScroll: true });
  }, [pathname, firstPath]);
  return (
    <Box sx={{ minHeight: '100dvh', display: 'flex', flexDirection: 'column' }}>
      <Box
        component="a"
        href="#content"
        sx={{
          position: 'absolute',
          left: 8,
          top: -60,
          zIndex: 1500,
          p: 1,
          bgcolor: 'background.paper',
          border: 1,
          '&:focus': { top: 8 },
        }}
      >
        Skip to the content
      </Box>
      <TopBar {...props} />
      {!online && (
        <Note tone="warning" live>
          This device is offline. What is shown may be out of date; changes are kept here and saved when the connection
          returns.
        </Note>
      )}
      <Box component="main" id="content" ref={main} tabIndex={-1} sx={{ flex: 1, minWidth: 0, outline: 'none' }}>
        {props.children}
      </Box>
      <Box
        component="footer"
        sx={{
          px: { xs: 2, md: 5 },
          py: 2,
          borderTop: 1,
          borderColor: 'divider',
          fontSize: '0.8125rem',
          color: 'text.secondary',
        }}
      >
        Exposure times are planning figures, to be confirmed by the observatory&rsquo;s instrument team. The
        site&rsquo;s own safety rules stand above anything shown here.{' '}
        <Link component={RouterLink} to={paths.sources.to()} underline="always">
          Sources of the reference data
        </Link>
        .
      </Box>
    </Box>
  );
}

function TopBar({ sections, person, personLinks, signInPath, onSignOut, deadline }: AppShellProps) {
  const [drawerOpen, setDrawerOpen] = useState(false);
  return (
    <Box
      component="header"
      sx={{
        display: 'flex',
        alignItems: 'center',
        gap: { xs: 1, md: 1.75, lg: 3.25 },
        px: { xs: 1.5, md: 3, lg: 5 },
        minHeight: 50,
        bgcolor: 'background.paper',
        borderBottom: 1,
        borderColor: 'divider',
      }}
    >
      <IconButton
        aria-label="Sections"
        onClick={() => setDrawerOpen(true)}
        sx={{ display: { md: 'none' } }}
        aria-expanded={drawerOpen}
      >
        <MenuIcon />
      </IconButton>
      <Box
        component={RouterLink}
        to="/"
        aria-label="Faintward, front page"
        sx={{
          display: 'flex',
          gap: 1.25,
          alignItems: 'center',
          textDecoration: 'none',
          fontFamily: 'h1.fontFamily',
          typography: 'h2',
          color: 'text.primary',
        }}
      >
        <Mark />
        Faintward
      </Box>
      <Box
        component="nav"
        aria-label="Sections"
        sx={{ display: { xs: 'none', md: 'flex' }, gap: { md: 2, lg: 3 }, alignSelf: 'stretch', overflowX: 'auto' }}
      >
        {sections.map((section) => (
          <Box key={section.to} component={NavLink} to={section.to} sx={sectionLink}>
            {section.label}
          </Box>
        ))}
      </Box>
      <Box sx={{ flex: 1 }} />
      {deadline && <DeadlineTicker {...deadline} />}
      <ThemeMenu />
      {person ? (
        <PersonMenu person={person} links={personLinks} onSignOut={onSignOut} />
      ) : (
        <Button component={RouterLink} to={signInPath} size="small">
          Sign in
        </Button>
      )}
      <Drawer open={drawerOpen} onClose={() => setDrawerOpen(false)} slotProps={{ paper: { sx: { width: 280 } } }}>
        <Box component="nav" aria-label="Sections" sx={{ p: 1 }} onClick={() => setDrawerOpen(false)}>
          <Box sx={{ display: 'flex', gap: 1.25, p: 1.5, alignItems: 'center', typography: 'h2' }}>
            <Mark /> Faintward
          </Box>
          {sections.map((section) => (
            <MenuItem key={section.to} component={NavLink} to={section.to} sx={drawerLink}>
              {section.label}
            </MenuItem>
          ))}
          {deadline && (
            <Box sx={{ p: 2, fontSize: '0.8125rem', color: 'text.secondary' }}>
              Closes in <Countdown until={deadline.at} />
              <br />
              {formatInstant(new Date(deadline.at), 'UTC')} UTC
            </Box>
          )}
        </Box>
      </Drawer>
    </Box>
  );
}

const sectionLink = {
  display: 'flex',
  alignItems: 'center',
  color: 'text.secondary',
  textDecoration: 'none',
  whiteSpace: 'nowrap',
  '&:hover': { color: 'text.primary' },
  '&:focus-visible': { outlineOffset: -3 },
  '&[aria-current]': { color: 'text.primary', boxShadow: `inset 0 -2px 0 ${colour.accent}` },
} as const;

const drawerLink = { '&[aria-current]': { boxShadow: `inset 3px 0 0 ${colour.accent}`, fontWeight: 600 } } as const;

function DeadlineTicker({ at, siteTimeZone }: { at: string; siteTimeZone: string }) {
  const date = new Date(at);
  return (
    <Box
      sx={{
        fontSize: '0.8125rem',
        color: 'text.secondary',
        whiteSpace: 'nowrap',
        display: { xs: 'none', sm: 'block' },
      }}
    >
      Closes in{' '}
      <Box component="b" sx={{ color: 'text.primary' }}>
        <Countdown until={at} />
      </Box>
      <Box component="span" sx={{ display: { xs: 'none', lg: 'inline' } }}>
        {' '}
        · {formatInstant(date, 'UTC')} UTC · {formatInstant(date, siteTimeZone).slice(11)} site
      </Box>
    </Box>
  );
}

const themes: readonly { choice: ThemeChoice; label: string; note: string }[] = [
  { choice: 'system', label: 'As the system', note: 'paper by day, slate by night' },
  { choice: 'paper', label: 'Paper', note: 'light' },
  { choice: 'slate', label: 'Slate', note: 'dark' },
  { choice: 'dome', label: 'Dome', note: 'deep red, keeps eyes adapted' },
];

function ThemeMenu() {
  const { choice, choose } = useThemeChoice();
  const [anchor, setAnchor] = useState<HTMLElement | null>(null);
  return (
    <>
      <IconButton
        aria-label="Theme"
        aria-haspopup="menu"
        aria-expanded={anchor !== null}
        onClick={(event) => setAnchor(event.currentTarget)}
        size="small"
      >
        <svg width="20" height="20" viewBox="0 0 20 20" aria-hidden="true">
          <circle cx="10" cy="10" r="7" fill="none" stroke="currentColor" strokeWidth="1.8" />
          <path d="M10 3 A7 7 0 0 1 10 17 A11 11 0 0 0 10 3" fill="currentColor" />
        </svg>
      </IconButton>
      <Menu anchorEl={anchor} open={anchor !== null} onClose={() => setAnchor(null)}>
        {themes.map((theme) => (
          <MenuItem
            key={theme.choice}
            role="menuitemradio"
            aria-checked={theme.choice === choice}
            selected={theme.choice === choice}
            onClick={() => {
              choose(theme.choice);
              setAnchor(null);
            }}
          >
            <ListItemText primary={theme.label} secondary={theme.note} />
          </MenuItem>
        ))}
      </Menu>
    </>
  );
}

function PersonMenu({
  person,
  links,
  onSignOut,
}: {
  person: { name: string; email: string };
  links: readonly ShellSection[];
  onSignOut: () => void;
}) {
  const [anchor, setAnchor] = useState<HTMLElement | null>(null);
  const close = () => setAnchor(null);
  return (
    <>
      <Button
        variant="text"
        size="small"
        aria-haspopup="menu"
        aria-expanded={anchor !== null}
        onClick={(event) => setAnchor(event.currentTarget)}
        sx={{ color: 'text.primary', fontWeight: 400, minWidth: 0, px: 1 }}
      >
        {abbreviate(person.name)}
      </Button>
      <Menu anchorEl={anchor} open={anchor !== null} onClose={close}>
        <ListSubheader sx={{ lineHeight: 1.4, py: 1 }}>
          {person.name}
          <br />
          {person.email}
        </ListSubheader>
        {links.map((link) => (
          <MenuItem key={link.to} component={RouterLink} to={link.to} onClick={close}>
            {link.label}
          </MenuItem>
        ))}
        <Divider />
        <MenuItem
          onClick={() => {
            close();
            onSignOut();
          }}
        >
          Sign out
        </MenuItem>
      </Menu>
    </>
  );
}

/** "Maddalena Orlandi" → "M. Orlandi". */
function abbreviate(name: string): string {
  const [first, ...rest] = name.split(' ');
  return rest.length > 0 && first ? `${first[0]}. ${rest.join(' ')}` : name;
}
