import type { SourceInCosmology } from '@faintward/contracts/light-report';
import TableCell from '@mui/material/TableCell';
import TableRow from '@mui/material/TableRow';
import Typography from '@mui/material/Typography';
import { formatNumber } from '../../lib/format';
import { ReportTable } from './ReportTable';

const mag = (value: number | null, signed = false) => formatNumber(value, { decimals: 3, signed });

/** One source in every cosmology, against the chosen one. */
export function CosmologiesTable({ rows }: { rows: readonly SourceInCosmology[] }) {
  const factors = rows.map((row) => row.skyLimitedTimeFactor).filter((factor) => factor !== null);
  const timeIsFixed = factors.length > 0 && factors.every((factor) => Math.abs(factor - 1) < 5e-4);
  return (
    <>
      <ReportTable
        label="Table of cosmologies"
        columns={[
          { id: 'title', title: 'Cosmology', isText: true },
          { id: 'modulus', title: 'Modulus', unit: 'mag' },
          {
            id: 'delta',
            title: 'Δ modulus',
            unit: 'mag',
            explanation: {
              title: 'Difference of the distance modulus',
              meaning: 'Against the chosen cosmology: positive is farther.',
              formula: 'ΔDM = DM − DM(chosen)',
            },
          },
          { id: 'apparent', title: 'm', unit: 'AB' },
          { id: 'absolute', title: 'M', unit: 'AB' },
          { id: 'scale', title: 'Scale', unit: 'kpc/″' },
          { id: 'age', title: 'Age', unit: 'Gyr' },
          {
            id: 'time',
            title: 'Time, where the sky limits',
            isText: true,
            explanation: {
              title: 'Exposure time against the chosen cosmology',
              meaning: 'Where sky noise limits, a source fainter by Δm asks for 10^(0.8 Δm) times the time.',
              formula: 't ∝ flux⁻²',
              source: 'Poisson noise of the sky',
            },
          },
        ]}
      >
        {rows.map((row) => (
          <TableRow key={row.cosmologyId} selected={row.isChosen}>
            <TableCell component="th" scope="row" sx={{ whiteSpace: 'nowrap', fontWeight: row.isChosen ? 600 : 400 }}>
              {row.title}
              {row.isChosen && ' (chosen)'}
            </TableCell>
            <TableCell align="right">{mag(row.distanceModulusMag)}</TableCell>
            <TableCell align="right">{row.isChosen ? '' : mag(row.deltaDistanceModulusMag, true)}</TableCell>
            <TableCell align="right">{mag(row.magnitudeAb)}</TableCell>
            <TableCell align="right">{mag(row.absoluteMagnitudeAb)}</TableCell>
            <TableCell align="right">{formatNumber(row.kpcPerArcsec, { decimals: 3 })}</TableCell>
            <TableCell align="right">{formatNumber(row.ageGyr, { decimals: 3 })}</TableCell>
            <TableCell sx={{ minWidth: 230 }}>{row.isChosen ? 'as estimated' : timeText(row)}</TableCell>
          </TableRow>
        ))}
      </ReportTable>
      {timeIsFixed && (
        <Typography variant="body2" color="textSecondary" sx={{ p: { xs: 2, md: 2.5 }, pt: 1 }}>
          The apparent brightness is given, so the cosmology changes sizes and luminosities here, not the time.
        </Typography>
      )}
    </>
  );
}

/** "asks 1.09 times the time: 0.046 mag fainter, because it would be farther". */
export function timeText(row: Pick<SourceInCosmology, 'skyLimitedTimeFactor' | 'deltaDistanceModulusMag'>): string {
  const factor = row.skyLimitedTimeFactor;
  if (factor === null) return 'not known without light';
  if (Math.abs(factor - 1) < 5e-4) return 'asks the same time';
  const asks = `asks ${formatNumber(factor, { decimals: Math.abs(factor - 1) < 0.01 ? 3 : 2 })} times the time`;
  const deltaMag = 1.25 * Math.log10(factor);
  const change = `${formatNumber(Math.abs(deltaMag), { decimals: 3 })} mag ${deltaMag > 0 ? 'fainter' : 'brighter'}`;
  const modulus = row.deltaDistanceModulusMag;
  if (modulus === null || Math.sign(modulus) !== Math.sign(deltaMag)) return `${asks}: ${change}`;
  return `${asks}: ${change}, because it would be ${modulus > 0 ? 'farther' : 'nearer'}`;
}
