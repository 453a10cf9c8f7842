import type { ReferenceDataList } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import Table from '@mui/material/Table';
import TableBody from '@mui/material/TableBody';
import TableCell from '@mui/material/TableCell';
import TableContainer from '@mui/material/TableContainer';
import TableHead from '@mui/material/TableHead';
import TableRow from '@mui/material/TableRow';
import Typography from '@mui/material/Typography';
import { provenanceLong } from '../words';

/** Every file of reference data that the numbers are made with. */
export function ReferenceDataTable({ rows }: { rows: ReferenceDataList['rows'] }) {
  return (
    <TableContainer tabIndex={0} role="region" aria-label="Table of reference data">
      <Table
        size="small"
        sx={{
          // On a phone a file is a paragraph, not a row to scroll along.
          display: { xs: 'block', md: 'table' },
          '& thead': { display: { xs: 'none', md: 'table-header-group' } },
          '& tbody, & tr, & td, & th': { display: { xs: 'block', md: 'revert' } },
          '& td, & th': { borderBottom: { xs: 'none', md: 1 }, borderColor: 'divider', py: { xs: 0.25, md: '7px' } },
          '& tbody tr': { borderBottom: { xs: 1, md: 0 }, borderColor: 'divider', py: { xs: 1.25, md: 0 } },
        }}
      >
        <TableHead>
          <TableRow>
            <TableCell>What</TableCell>
            <TableCell>Source</TableCell>
            <TableCell>How it is known</TableCell>
            <TableCell>Units</TableCell>
            <TableCell>Licence</TableCell>
            <TableCell>Version</TableCell>
          </TableRow>
        </TableHead>
        <TableBody>
          {rows.map((row) => (
            <TableRow key={row.file} sx={{ verticalAlign: 'top' }}>
              <TableCell component="th" scope="row" sx={{ minWidth: 180 }}>
                <Box sx={{ fontWeight: 600 }}>{row.title}</Box>
                <Typography variant="figure" color="textSecondary" sx={{ overflowWrap: 'anywhere' }}>
                  {row.file}
                </Typography>
              </TableCell>
              <TableCell sx={{ minWidth: 220, overflowWrap: 'anywhere' }}>{row.source}</TableCell>
              <TableCell sx={{ minWidth: 150 }}>{provenanceLong[row.provenance]}</TableCell>
              <TableCell>{row.units}</TableCell>
              <TableCell>{row.licence}</TableCell>
              <TableCell>
                <code>{row.contentHash.slice(0, 12)}</code>
              </TableCell>
            </TableRow>
          ))}
        </TableBody>
      </Table>
    </TableContainer>
  );
}
