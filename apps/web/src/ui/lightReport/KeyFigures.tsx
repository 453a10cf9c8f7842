import type { LightReport } from '@faintward/contracts/light-report';
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { formatNumber } from '../../lib/format';
import { Explained, Quantity } from '../Quantity';
import { RedshiftValue } from '../RedshiftValue';
import { keyExplanations } from './explanations';
import { Figures, type Figure } from './Figures';

/** The answer in one line of numbers: how bright, how far, how long ago. */
export function KeyFigures({ report }: { report: LightReport }) {
  const explained = keyExplanations(report);
  const { ledger, distances, uncertainty } = report;
  const spread = uncertainty?.magnitudeAb;
  const { absoluteMagnitudeAb: absolute, unlensedMagnitudeAb: unlensed } = report;
  const magnitude = { unit: 'AB', decimals: 2 };
  const figures: Figure[] = [
    ...(absolute === null
      ? []
      : [{ label: 'Absolute magnitude', value: absolute, ...magnitude, explanation: explained.absolute }]),
    ...(unlensed === null
      ? []
      : [{ label: 'Without the lens', value: unlensed, ...magnitude, explanation: explained.unlensed }]),
    {
      label: 'Distance modulus',
      value: distances.distanceModulusMag,
      unit: 'mag',
      decimals: 4,
      explanation: explained.modulus,
      unknownReason: 'It has no value at z = 0.',
    },
    {
      label: 'Luminosity distance',
      value: distances.luminosityDistanceMpc / 1000,
      unit: 'Gpc',
      decimals: 3,
      explanation: explained.luminosityDistance,
    },
    { label: 'Scale', value: distances.kpcPerArcsec, unit: 'kpc/″', decimals: 3, explanation: explained.scale },
    {
      label: 'Age then',
      value: distances.ageGyr,
      unit: 'Gyr',
      decimals: 3,
      explanation: explained.age,
      unknownReason: 'This universe has no beginning.',
    },
    {
      label: 'Lookback time',
      value: distances.lookbackTimeGyr,
      unit: 'Gyr',
      decimals: 3,
      explanation: explained.lookback,
    },
  ];
  return (
    <>
      {ledger && (
        <Box sx={{ mb: 2 }} aria-live="polite">
          <Typography variant="body2" color="textSecondary">
            {ledger.label} above the atmosphere
          </Typography>
          {ledger.totalMagnitudeAb === null ? (
            <Typography variant="h2" component="p">
              {ledger.reason?.message ?? 'No magnitude is known.'}
            </Typography>
          ) : (
            <Typography component="p" sx={{ fontSize: '1.625rem', fontWeight: 600, lineHeight: 1.25 }}>
              <Explained explanation={explained.apparent}>
                {formatNumber(ledger.totalMagnitudeAb, { decimals: 2 })} AB
              </Explained>
              {spread && (
                <Box component="span" sx={{ fontSize: '0.9375rem', fontWeight: 400, color: 'text.secondary', ml: 1.5 }}>
                  {formatNumber(spread.p16, { decimals: 2 })} to {formatNumber(spread.p84, { decimals: 2 })} in 68 % of
                  the draws
                </Box>
              )}
            </Typography>
          )}
          {ledger.lineFluxErgSCm2 !== null && (
            <Typography>
              Line flux <Quantity value={ledger.lineFluxErgSCm2} unit="erg/s/cm²" significant={3} strong />
            </Typography>
          )}
        </Box>
      )}
      <Figures figures={[{ label: 'Redshift', node: <RedshiftValue redshift={report.redshift} /> }, ...figures]} />
    </>
  );
}
