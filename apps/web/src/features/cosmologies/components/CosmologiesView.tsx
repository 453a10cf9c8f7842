import type { ProposalCosmologies } from '@faintward/contracts/light-report';
import Table from '@mui/material/Table';
import TableBody from '@mui/material/TableBody';
import TableCell from '@mui/material/TableCell';
import TableContainer from '@mui/material/TableContainer';
import TableHead from '@mui/material/TableHead';
import TableRow from '@mui/material/TableRow';
import Typography from '@mui/material/Typography';
import { counted, formatNumber } from '../../../lib/format';
import { Panel } from '../../../ui/Panel';
import { Explained } from '../../../ui/Quantity';
import { changeText, infeasibleText, whatDependsText } from '../words';

/** What the choice of cosmology changes in a proposal: distances, sizes, and the time where brightness is intrinsic. */
export function CosmologiesView({ comparison }: { comparison: ProposalCosmologies }) {
  const { rows } = comparison;
  const chosen = rows.find((row) => row.isChosen);
  return (
    <Panel
      title="What the choice of cosmology changes"
      note={`${counted(comparison.targetCount, 'target')}, ${counted(comparison.observationCount, 'observation')}${
        chosen ? `; against ${chosen.title}, which the proposal uses` : ''
      }.`}
      flush
    >
      <TableContainer tabIndex={0} role="region" aria-label="Table of cosmologies">
        <Table size="small">
          <TableHead>
            <TableRow>
              <TableCell>Cosmology</TableCell>
              <TableCell align="right">
                <Explained
                  explanation={{
                    title: 'Median difference of the distance modulus',
                    meaning:
                      'Over the targets that have a distance, against the chosen cosmology. Positive is farther.',
                    formula: 'median of DM − DM(chosen)',
                  }}
                >
                  Δ modulus
                </Explained>
                <br />
                mag, median
              </TableCell>
              <TableCell align="right">
                Largest
                <br />
                mag
              </TableCell>
              <TableCell align="right">
                <Explained
                  explanation={{
                    title: 'Scale',
                    meaning: 'Kiloparsec in an arcsecond, against the chosen cosmology: the median over the targets.',
                  }}
                >
                  Scale
                </Explained>
                <br />
                ratio, median
              </TableCell>
              <TableCell align="right">
                Asked
                <br />h
              </TableCell>
              <TableCell>Change</TableCell>
              <TableCell>Feasibility</TableCell>
            </TableRow>
          </TableHead>
          <TableBody>
            {rows.map((row) => (
              <TableRow key={row.cosmologyId} selected={row.isChosen}>
                <TableCell
                  component="th"
                  scope="row"
                  sx={{ whiteSpace: 'nowrap', fontWeight: row.isChosen ? 600 : 400 }}
                >
                  {row.title}
                  {row.isChosen && ' (chosen)'}
                </TableCell>
                <TableCell align="right">
                  {row.isChosen ? '' : formatNumber(row.medianDeltaDistanceModulusMag, { decimals: 3, signed: true })}
                </TableCell>
                <TableCell align="right">
                  {row.isChosen ? '' : formatNumber(row.largestDeltaDistanceModulusMag, { decimals: 3, signed: true })}
                </TableCell>
                <TableCell align="right">
                  {row.isChosen ? '' : formatNumber(row.medianScaleRatio, { decimals: 3 })}
                </TableCell>
                <TableCell align="right">{formatNumber(row.requestedSeconds / 3600, { decimals: 1 })}</TableCell>
                <TableCell sx={{ minWidth: 170 }}>{chosen ? changeText(row, chosen) : ''}</TableCell>
                <TableCell sx={{ minWidth: 170 }}>{chosen ? infeasibleText(row, chosen) : ''}</TableCell>
              </TableRow>
            ))}
          </TableBody>
        </Table>
      </TableContainer>
      <Typography sx={{ p: { xs: 2, md: 2.5 }, maxWidth: 760 }}>{whatDependsText(comparison)}</Typography>
    </Panel>
  );
}
