import Box from '@mui/material/Box';
import type { SxProps, Theme } from '@mui/material/styles';
import Typography from '@mui/material/Typography';
import { useId, type ReactNode } from 'react';

export interface PanelProps {
  title?: ReactNode;
  /** One quiet line under the title. */
  note?: ReactNode;
  actions?: ReactNode;
  children: ReactNode;
  /** Without inner padding, for tables that run to the edge. */
  flush?: boolean;
  sx?: SxProps<Theme>;
}

/** A sheet of paper on the ground: one hairline, no shadow. With a title it is a landmark. */
export function Panel({ title, note, actions, children, flush = false, sx }: PanelProps) {
  const id = useId();
  const padding = { xs: 2, md: 2.5 };
  return (
    <Box
      component="section"
      aria-labelledby={title ? id : undefined}
      sx={[
        { bgcolor: 'background.paper', border: 1, borderColor: 'divider', borderRadius: '6px', minWidth: 0 },
        { p: flush ? 0 : padding },
        // Tables run to the edge, their text stands under the heading.
        flush
          ? {
              '& .MuiTableCell-root:first-of-type': { pl: padding },
              '& .MuiTableCell-root:last-of-type': { pr: padding },
            }
          : {},
        ...(Array.isArray(sx) ? sx : [sx]),
      ]}
    >
      {(title || actions) && (
        <Box sx={{ display: 'flex', gap: 2, alignItems: 'flex-start', mb: flush ? 0 : 2, p: flush ? padding : 0 }}>
          <Box sx={{ flex: 1, minWidth: 0 }}>
            {title && (
              <Typography variant="h3" component="h2" id={id}>
                {title}
              </Typography>
            )}
            {note && (
              <Typography variant="body2" color="textSecondary" component="div" sx={{ mt: 0.25 }}>
                {note}
              </Typography>
            )}
          </Box>
          {actions}
        </Box>
      )}
      {children}
    </Box>
  );
}
