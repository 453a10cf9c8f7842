import type { ObservedLine } from '@faintward/contracts/light-report';
import TableCell from '@mui/material/TableCell';
import TableRow from '@mui/material/TableRow';
import { formatNumber } from '../../lib/format';
import { ReportTable } from './ReportTable';

const nm = (value: number | null) => formatNumber(value, { decimals: value !== null && value >= 10_000 ? 0 : 2 });

/** Where the lines arrive, and whether the atmosphere lets them through. */
export function LinesTable({ lines }: { lines: readonly ObservedLine[] }) {
  const hasFlux = lines.some((line) => line.fluxErgSCm2 !== null);
  const hasWidth = lines.some((line) => line.observedEquivalentWidthNm !== null);
  return (
    <ReportTable
      label="Table of lines"
      columns={[
        { id: 'line', title: 'Line', isText: true },
        {
          id: 'rest',
          title: 'At rest',
          unit: 'nm, vacuum',
        },
        {
          id: 'vacuum',
          title: 'Observed',
          unit: 'nm, vacuum',
          explanation: { title: 'Observed wavelength', formula: 'λ = λ_rest (1 + z)', meaning: 'In vacuum.' },
        },
        {
          id: 'air',
          title: 'Observed',
          unit: 'nm, air',
          explanation: {
            title: 'Observed wavelength in air',
            meaning: 'Shorter than in vacuum by the refraction of air, about 0.03 %. Not given below 200 nm.',
          },
        },
        { id: 'bands', title: 'In', isText: true },
        { id: 'place', title: 'Atmosphere', isText: true },
        ...(hasFlux ? [{ id: 'flux', title: 'Flux', unit: 'erg/s/cm²' }] : []),
        ...(hasWidth ? [{ id: 'width', title: 'Equivalent width', unit: 'nm, observed' }] : []),
      ]}
    >
      {lines.map((line) => (
        <TableRow key={line.lineId}>
          <TableCell component="th" scope="row" sx={{ fontWeight: 600, whiteSpace: 'nowrap' }}>
            {line.label}
          </TableCell>
          <TableCell align="right">{nm(line.restWavelengthNm)}</TableCell>
          <TableCell align="right">{nm(line.observedWavelengthNm)}</TableCell>
          <TableCell align="right">{nm(line.observedAirWavelengthNm)}</TableCell>
          <TableCell sx={{ minWidth: 72 }}>{line.bandIds.length > 0 ? line.bandIds.join(', ') : 'no band'}</TableCell>
          <TableCell sx={{ minWidth: 170, color: line.place === 'window' ? undefined : 'text.secondary' }}>
            {placeText(line)}
          </TableCell>
          {hasFlux && <TableCell align="right">{formatNumber(line.fluxErgSCm2, { significant: 3 })}</TableCell>}
          {hasWidth && (
            <TableCell align="right">{formatNumber(line.observedEquivalentWidthNm, { significant: 3 })}</TableCell>
          )}
        </TableRow>
      ))}
    </ReportTable>
  );
}

function placeText(line: ObservedLine): string {
  if (line.place === 'window') return `window: ${line.placeLabel}`;
  if (line.place === 'gap') return `does not come through: ${line.placeLabel}`;
  return line.placeLabel;
}
