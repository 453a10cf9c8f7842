import type { BandId } from '@faintward/contracts/light';
import type { BandLight } from '@faintward/contracts/light-report';
import Button from '@mui/material/Button';
import TableCell from '@mui/material/TableCell';
import TableRow from '@mui/material/TableRow';
import { formatNumber } from '../../lib/format';
import { bandExplanations } from './explanations';
import { ReportTable } from './ReportTable';
import { fluxUnit } from './spectrum';

/** The light in every band, or in words why there is none. */
export function BandsTable({
  bands,
  chosen,
  onChoose,
}: {
  bands: readonly BandLight[];
  chosen: BandId | null;
  onChoose: (bandId: BandId) => void;
}) {
  const { unit, perJy } = fluxUnit(bands.reduce((largest, band) => Math.max(largest, band.fluxDensityJy ?? 0), 0));
  return (
    <ReportTable
      label="Table of bands"
      columns={[
        { id: 'band', title: 'Band', isText: true },
        { id: 'range', title: 'Range', unit: 'nm' },
        { id: 'ab', title: 'AB', unit: 'mag', explanation: bandExplanations.ab },
        { id: 'vega', title: 'Vega', unit: 'mag', explanation: bandExplanations.vega },
        { id: 'flux', title: 'Flux density', unit },
        { id: 'through', title: 'Let through', unit: '%', explanation: bandExplanations.transmission },
        { id: 'choose', title: 'Light budget', isText: true },
      ]}
    >
      {bands.map((band) => (
        <TableRow key={band.bandId} selected={band.bandId === chosen}>
          <TableCell component="th" scope="row" sx={{ fontWeight: 600 }}>
            {band.label}
          </TableCell>
          <TableCell align="right" sx={{ whiteSpace: 'nowrap' }}>
            {formatNumber(band.wavelengthLowNm, { decimals: 0 })}–{formatNumber(band.wavelengthHighNm, { decimals: 0 })}
          </TableCell>
          {band.reason || band.magnitudeAb === null ? (
            <TableCell colSpan={4} sx={{ color: 'text.secondary', minWidth: 220 }}>
              {band.reason?.message ?? 'Not known.'}
            </TableCell>
          ) : (
            <>
              <TableCell align="right">{formatNumber(band.magnitudeAb, { decimals: 2 })}</TableCell>
              <TableCell align="right">{formatNumber(band.magnitudeVega, { decimals: 2 })}</TableCell>
              <TableCell align="right">
                {formatNumber(band.fluxDensityJy === null ? null : band.fluxDensityJy * perJy, { significant: 3 })}
              </TableCell>
              <TableCell align="right">
                {formatNumber(band.intergalacticTransmission === null ? null : 100 * band.intergalacticTransmission, {
                  decimals: 0,
                })}
              </TableCell>
            </>
          )}
          <TableCell>
            {band.bandId === chosen ? (
              'shown'
            ) : (
              <Button
                size="small"
                variant="text"
                aria-label={`Light budget in ${band.label}`}
                onClick={() => onChoose(band.bandId)}
                sx={{ py: 0, minWidth: 0, px: 0.5 }}
              >
                Show
              </Button>
            )}
          </TableCell>
        </TableRow>
      ))}
    </ReportTable>
  );
}
