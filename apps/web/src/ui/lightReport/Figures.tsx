import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import type { ReactNode } from 'react';

/** Numbers with their names, in as many columns as fit. */
export function Figures({ figures }: { figures: readonly { label: string; node: ReactNode }[] }) {
  return (
    <Box
      component="dl"
      sx={{
        m: 0,
        display: 'grid',
        columnGap: 2.5,
        rowGap: 1.5,
        gridTemplateColumns: 'repeat(auto-fill, minmax(150px, 1fr))',
      }}
    >
      {figures.map((figure) => (
        <div key={figure.label}>
          <Typography variant="body2" color="textSecondary" component="dt">
            {figure.label}
          </Typography>
          <dd>{figure.node}</dd>
        </div>
      ))}
    </Box>
  );
}
