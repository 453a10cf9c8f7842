import Box from '@mui/material/Box';
import type { ReactNode } from 'react';
import { colour } from '../theme/theme';

export type NoteTone = 'note' | 'warning' | 'error' | 'good';
const tones = { note: colour.primary, warning: colour.warn, error: colour.bad, good: colour.good };
/** Said before the text, so that the tone does not hang on colour. */
const words = { note: '', warning: 'Caution: ', error: 'Error: ', good: '' };

/** A remark on raised ground with a coloured edge. `live` announces it to screen readers when it appears. */
export function Note({
  tone = 'note',
  live = false,
  action,
  children,
}: {
  tone?: NoteTone;
  live?: boolean;
  action?: ReactNode;
  children: ReactNode;
}) {
  return (
    <Box
      role={live ? (tone === 'error' ? 'alert' : 'status') : undefined}
      sx={{
        display: 'flex',
        flexWrap: 'wrap',
        gap: 1.5,
        alignItems: 'center',
        borderLeft: `3px solid ${tones[tone]}`,
        bgcolor: 'faintward.raised',
        px: 1.75,
        py: 1,
        fontSize: '0.875rem',
      }}
    >
      <Box sx={{ flex: '1 1 240px', minWidth: 0, overflowWrap: 'anywhere' }}>
        {words[tone] && <strong>{words[tone]}</strong>}
        {children}
      </Box>
      {action}
    </Box>
  );
}
