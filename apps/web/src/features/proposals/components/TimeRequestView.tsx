import type { TimeRequest } from '@faintward/contracts/observations';
import Box from '@mui/material/Box';
import Stack from '@mui/material/Stack';
import Table from '@mui/material/Table';
import TableBody from '@mui/material/TableBody';
import TableCell from '@mui/material/TableCell';
import TableContainer from '@mui/material/TableContainer';
import TableFooter from '@mui/material/TableFooter';
import TableHead from '@mui/material/TableHead';
import TableRow from '@mui/material/TableRow';
import { counted, formatNumber } from '../../../lib/format';
import { Note } from '../../../ui/Note';
import { Panel } from '../../../ui/Panel';
import { Explained } from '../../../ui/Quantity';

const hours = (value: number) => formatNumber(value, { decimals: 1 });

/** The request in hours, by telescope, instrument and moon class, with what of it is overhead. */
export function TimeRequestView({ request }: { request: TimeRequest }) {
  return (
    <Stack sx={{ gap: 2.25 }}>
      {request.infeasibleCount > 0 && (
        <Note tone="warning">
          {counted(request.infeasibleCount, 'observation')} cannot reach the goal and asks for no time. The reason
          stands beside each under Exposures.
        </Note>
      )}
      {request.lackingCount > 0 && (
        <Note tone="warning">
          {counted(request.lackingCount, 'observation')} has no estimate yet, because the target says nothing about its
          light.
        </Note>
      )}
      <Panel
        title="What is asked for"
        note="Exposures and overheads of every feasible observation, with its repeats. Planning figures, to be confirmed by the observatory's instrument team."
        flush
      >
        <TableContainer tabIndex={0} role="region" aria-label="The request in hours">
          <Table size="small">
            <TableHead>
              <TableRow>
                <TableCell>Telescope</TableCell>
                <TableCell>Instrument</TableCell>
                <TableCell>Moon</TableCell>
                <TableCell align="right">Observations</TableCell>
                <TableCell align="right">
                  Open shutter
                  <Box component="small" sx={{ display: 'block', fontWeight: 400 }}>
                    h
                  </Box>
                </TableCell>
                <TableCell align="right">
                  <Explained
                    explanation={{
                      title: 'Overhead',
                      meaning:
                        'Time in which the telescope is yours and the shutter is closed: acquisition at the start of each block, setting up once, read-out and dither after each exposure.',
                      source: "the instrument's table of overheads, in the configuration each estimate names",
                    }}
                  >
                    Overhead
                  </Explained>
                  <Box component="small" sx={{ display: 'block', fontWeight: 400 }}>
                    h
                  </Box>
                </TableCell>
                <TableCell align="right">
                  Total
                  <Box component="small" sx={{ display: 'block', fontWeight: 400 }}>
                    h
                  </Box>
                </TableCell>
              </TableRow>
            </TableHead>
            <TableBody>
              {request.rows.map((row) => (
                <TableRow key={`${row.telescopeName} ${row.instrumentName} ${row.moonClass}`}>
                  <TableCell>{row.telescopeName}</TableCell>
                  <TableCell>{row.instrumentName}</TableCell>
                  <TableCell>{row.moonClass}</TableCell>
                  <TableCell align="right">{row.observationCount}</TableCell>
                  <TableCell align="right">{hours(row.openShutterHours)}</TableCell>
                  <TableCell align="right">{hours(row.overheadHours)}</TableCell>
                  <TableCell align="right">
                    <strong>{hours(row.totalHours)}</strong>
                  </TableCell>
                </TableRow>
              ))}
            </TableBody>
            <TableFooter>
              <TableRow>
                <TableCell colSpan={6} sx={{ color: 'text.secondary', fontSize: '0.875rem' }}>
                  dark {hours(request.totals.dark)} h · grey {hours(request.totals.grey)} h · bright{' '}
                  {hours(request.totals.bright)} h
                </TableCell>
                <TableCell align="right" sx={{ color: 'text.primary', fontSize: '0.875rem' }}>
                  <strong data-testid="request-total-hours">{hours(request.totalHours)}</strong>
                </TableCell>
              </TableRow>
            </TableFooter>
          </Table>
        </TableContainer>
      </Panel>
    </Stack>
  );
}
