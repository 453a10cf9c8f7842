import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import type { ReactNode } from 'react';

/** Why there is nothing, and the first thing to do about it (only if the person may). */
export function EmptyState({ title, children, action }: { title: string; children?: ReactNode; action?: ReactNode }) {
  return (
    <Box sx={{ px: 3, py: 5, textAlign: 'center', maxWidth: 520, mx: 'auto' }}>
      <svg width="96" height="22" viewBox="0 0 96 22" aria-hidden="true">
        <line x1="8" x2="88" y1="11" y2="11" stroke="var(--fw-palette-divider)" strokeWidth="2" />
        {[8, 35, 62, 88].map((x) => (
          <circle
            key={x}
            cx={x}
            cy="11"
            r="6"
            fill="var(--fw-palette-background-paper)"
            stroke="var(--fw-palette-divider)"
            strokeWidth="2"
          />
        ))}
      </svg>
      <Typography variant="h3" component="p" sx={{ mt: 1.5 }}>
        {title}
      </Typography>
      {children && (
        <Typography color="textSecondary" component="div" sx={{ mt: 0.75 }}>
          {children}
        </Typography>
      )}
      {action && <Box sx={{ mt: 2 }}>{action}</Box>}
    </Box>
  );
}
