import type { ReferenceDataList } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { Fragment, type ReactNode } from 'react';
import { provenanceLong } from '../words';

/** Every file of reference data that the numbers are made with, with where it comes from. */
export function ReferenceDataFiles({ rows }: { rows: ReferenceDataList['rows'] }) {
  return (
    <Box component="ul" sx={{ listStyle: 'none', m: 0, p: 0 }}>
      {rows.map((row) => (
        <Box
          component="li"
          key={row.file}
          sx={{
            display: 'grid',
            gridTemplateColumns: { xs: 'minmax(0, 1fr)', md: 'minmax(0, 4fr) minmax(0, 9fr)' },
            columnGap: 4,
            rowGap: 1,
            borderTop: 1,
            borderColor: 'divider',
            px: { xs: 2, md: 2.5 },
            py: 1.75,
          }}
        >
          <div>
            <Typography variant="h3">{row.title}</Typography>
            <Typography variant="figure" color="textSecondary" sx={{ overflowWrap: 'anywhere' }}>
              {row.file}
            </Typography>
          </div>
          <Facts
            facts={[
              ['Source', row.source],
              ['Known by', provenanceLong[row.provenance]],
              ['Units', row.units],
              ['Licence', row.licence],
              ['Version', <code key="version">{row.contentHash.slice(0, 12)}</code>],
            ]}
          />
        </Box>
      ))}
    </Box>
  );
}

function Facts({ facts }: { facts: readonly (readonly [string, ReactNode])[] }) {
  return (
    <Box
      component="dl"
      sx={{
        m: 0,
        display: 'grid',
        gridTemplateColumns: '72px minmax(0, 1fr)',
        columnGap: 1.5,
        rowGap: 0.25,
        fontSize: '0.875rem',
        overflowWrap: 'anywhere',
      }}
    >
      {facts.map(([name, value]) => (
        <Fragment key={name}>
          <Box component="dt" sx={{ color: 'text.secondary' }}>
            {name}
          </Box>
          <Box component="dd" sx={{ m: 0 }}>
            {value}
          </Box>
        </Fragment>
      ))}
    </Box>
  );
}
