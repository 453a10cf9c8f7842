import type { Target } from '@faintward/contracts/targets';
import Box from '@mui/material/Box';
import { RedshiftValue } from '../RedshiftValue';

/** A target's redshift with its square and, behind it, how well it is known: `± 0.02`, `+0.05 −0.03`, `p(z), 2 peaks`. */
export function RedshiftWithUncertainty({
  target: { redshift, redshiftUncertainty, redshiftUncertaintyText },
  decimals = 3,
}: {
  target: Pick<Target, 'redshift' | 'redshiftUncertainty' | 'redshiftUncertaintyText'>;
  decimals?: number;
}) {
  if (redshiftUncertainty === null || redshiftUncertainty.kind === 'gaussian') {
    return <RedshiftValue redshift={redshift} uncertainty={redshiftUncertainty?.sigma} decimals={decimals} />;
  }
  return (
    <Box component="span" sx={{ whiteSpace: 'nowrap' }}>
      <RedshiftValue redshift={redshift} decimals={decimals} />{' '}
      <Box component="span" sx={{ color: 'text.secondary' }}>
        {redshiftUncertaintyText}
      </Box>
    </Box>
  );
}
