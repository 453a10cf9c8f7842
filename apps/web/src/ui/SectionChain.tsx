import Box from '@mui/material/Box';
import { useEffect, useRef } from 'react';
import { NavLink } from 'react-router-dom';
import { colour } from '../theme/theme';
import { visuallyHidden } from './visuallyHidden';

export interface ChainSection {
  label: string;
  to: string;
  /** `complete` fills the line; `lacking` says in `detail` what is missing; `open` has not been started or is optional. */
  state: 'complete' | 'lacking' | 'open';
  /** What it holds ("5 targets") or lacks ("figure missing"). */
  detail?: string;
}

const stateWords = { complete: 'complete', lacking: 'not complete', open: 'open' };

/** The chain: a proposal's sections as one line from targets to submission. Also its navigation. */
export function SectionChain({
  sections,
  label = 'Sections of the proposal',
}: {
  sections: readonly ChainSection[];
  label?: string;
}) {
  const list = useRef<HTMLOListElement>(null);
  useEffect(() => {
    // On a phone the line is longer than the screen: bring the present section into view, without moving the page.
    const here = list.current?.querySelector<HTMLElement>('[aria-current]')?.closest('li');
    if (here && list.current) list.current.scrollLeft = here.offsetLeft - 16;
  });
  return (
    <Box component="nav" aria-label={label} sx={{ my: 2.25 }}>
      <Box
        component="ol"
        ref={list}
        sx={{
          display: 'flex',
          m: 0,
          p: 0,
          pt: '4px',
          listStyle: 'none',
          overflowX: 'auto',
          overflowY: 'hidden',
          position: 'relative',
          scrollbarWidth: 'none',
        }}
      >
        {sections.map((section) => (
          <Box
            component="li"
            key={section.to}
            sx={{
              flex: '1 0 auto',
              minWidth: { xs: 116, md: 104 },
              position: 'relative',
              '&::before': {
                content: '""',
                position: 'absolute',
                left: 0,
                right: 0,
                top: '6px',
                height: '2px',
                background: section.state === 'complete' ? colour.primary : colour.line,
              },
            }}
          >
            <Box
              component={NavLink}
              to={section.to}
              sx={{
                display: 'block',
                pt: '20px',
                pr: 2,
                pb: 0.5,
                textDecoration: 'none',
                color: 'text.secondary',
                fontSize: '0.875rem',
                '&:hover .chain-label': { textDecoration: 'underline' },
                '&:focus-visible': { outlineOffset: -2 },
                '&::after': {
                  content: '""',
                  position: 'absolute',
                  left: 0,
                  top: 0,
                  width: 14,
                  height: 14,
                  boxSizing: 'border-box',
                  borderRadius: '50%',
                  border: `2px solid ${section.state === 'complete' ? colour.primary : colour.edge}`,
                  background: section.state === 'complete' ? colour.primary : colour.ground,
                },
                '&[aria-current]': { color: 'text.primary', fontWeight: 600 },
                '&[aria-current]::after': { borderColor: colour.accent, borderWidth: '4px' },
              }}
            >
              <Box component="span" className="chain-label" sx={{ display: 'block' }}>
                {section.label}
                <Box component="span" sx={visuallyHidden}>
                  , {stateWords[section.state]}
                </Box>
              </Box>
              {section.detail && (
                <Box
                  component="span"
                  sx={{
                    display: 'block',
                    fontWeight: 400,
                    fontSize: '0.8125rem',
                    color: section.state === 'lacking' ? 'error.main' : 'text.secondary',
                  }}
                >
                  {section.detail}
                </Box>
              )}
            </Box>
          </Box>
        ))}
      </Box>
    </Box>
  );
}
