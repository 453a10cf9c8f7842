import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import type { ReactNode } from 'react';
import { Quantity, type QuantityProps } from '../Quantity';

/** A quantity, or what else stands under its name. */
export type Figure = { label: string } & (QuantityProps | { node: ReactNode });

/** Numbers with their names, in as many columns as fit. */
export function Figures({ figures }: { figures: readonly Figure[] }) {
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
      {figures.map(({ label, ...figure }) => (
        <div key={label}>
          <Typography variant="body2" color="textSecondary" component="dt">
            {label}
          </Typography>
          <dd>{'node' in figure ? figure.node : <Quantity {...figure} />}</dd>
        </div>
      ))}
    </Box>
  );
}
