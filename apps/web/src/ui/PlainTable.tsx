import Box from '@mui/material/Box';
import type { SxProps, Theme } from '@mui/material/styles';
import type { ReactNode } from 'react';

/** A quiet table as wide as its place. `sx` says how its cells stand. */
export function PlainTable({ sx, children }: { sx: SxProps<Theme>; children: ReactNode }) {
  return (
    <Box
      component="table"
      sx={[{ width: '100%', borderCollapse: 'collapse', fontSize: '0.875rem' }, ...(Array.isArray(sx) ? sx : [sx])]}
    >
      {children}
    </Box>
  );
}
