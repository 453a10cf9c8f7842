import Box from '@mui/material/Box';
import { redshiftColour } from '../../../theme/redshiftColour';
import { colour } from '../../../theme/theme';

const stations = [
  ['a source', 'redshift, light, size'],
  ['its distance', 'in every sense'],
  ['what arrives', 'dimmed, shifted, absorbed'],
  ['the sky', 'moon, seeing, airmass'],
  ['the exposure', 'S/N, limits, overheads'],
  ['the request', 'hours by moon class'],
  ['the ranking', 'calibrated, with intervals'],
  ['the night', 'planned and charged'],
] as const;

/** The chain of numbers as one line, from far (rust) to here (blue-grey). */
export function LightPath() {
  return (
    <Box
      component="ol"
      aria-label="What Faintward carries through"
      sx={{
        listStyle: 'none',
        p: 0,
        m: 0,
        mt: { xs: 3, md: 5 },
        display: 'grid',
        gridTemplateColumns: { xs: '1fr 1fr', sm: 'repeat(4, 1fr)', lg: 'repeat(8, 1fr)' },
        rowGap: 2.5,
      }}
    >
      {stations.map(([name, detail], index) => (
        <Box
          component="li"
          key={name}
          sx={{
            position: 'relative',
            pt: '22px',
            pr: 1.5,
            fontSize: '0.8125rem',
            color: 'text.secondary',
            '&::before': {
              content: '""',
              position: 'absolute',
              top: '6px',
              left: 0,
              right: 0,
              height: '2px',
              background: index === stations.length - 1 ? 'transparent' : colour.line,
            },
            '&::after': {
              content: '""',
              position: 'absolute',
              top: '1px',
              left: 0,
              width: 12,
              height: 12,
              borderRadius: '50%',
              background: redshiftColour(14 * (1 - index / (stations.length - 1))),
            },
          }}
        >
          <Box
            component="strong"
            sx={{ display: 'block', color: 'text.primary', fontSize: '0.9375rem', fontWeight: 600 }}
          >
            {name}
          </Box>
          {detail}
        </Box>
      ))}
    </Box>
  );
}
