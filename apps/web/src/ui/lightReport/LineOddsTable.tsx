import type { LightUncertainty } from '@faintward/contracts/light-report';
import TableCell from '@mui/material/TableCell';
import TableRow from '@mui/material/TableRow';
import { formatNumber } from '../../lib/format';
import { ReportTable } from './ReportTable';
import { percentText } from './uncertainty';

const nm = (value: number) => formatNumber(value, { decimals: value < 10_000 ? 1 : 0 });

/** Where several lines fall, by the draws. */
export function LineOddsTable({ lines, bandLabel }: { lines: LightUncertainty['lines']; bandLabel: string | null }) {
  return (
    <ReportTable
      label="Table of lines in the draws"
      columns={[
        { id: 'line', title: 'Line', isText: true },
        { id: 'median', title: 'Observed', unit: 'nm, median' },
        { id: 'range', title: '68 % within', unit: 'nm' },
        ...(bandLabel ? [{ id: 'band', title: `Falls in ${bandLabel}`, unit: 'probability' }] : []),
        { id: 'window', title: 'In a window', unit: 'probability' },
      ]}
    >
      {lines.map((line) => (
        <TableRow key={line.lineId}>
          <TableCell component="th" scope="row" sx={{ fontWeight: 600, whiteSpace: 'nowrap' }}>
            {line.label}
          </TableCell>
          <TableCell align="right">{nm(line.observedWavelengthNm.p50)}</TableCell>
          <TableCell align="right" sx={{ whiteSpace: 'nowrap' }}>
            {nm(line.observedWavelengthNm.p16)}–{nm(line.observedWavelengthNm.p84)}
          </TableCell>
          {bandLabel && <TableCell align="right">{percentText(line.insideBandProbability)}</TableCell>}
          <TableCell align="right">{percentText(line.insideWindowProbability)}</TableCell>
        </TableRow>
      ))}
    </ReportTable>
  );
}
