import { formatNumber } from '../lib/format';
import { redshiftColour } from '../theme/redshiftColour';

/** A redshift: its square on the ramp, and always its number. `uncertainty` is one standard deviation. */
export function RedshiftValue({
  redshift,
  uncertainty,
  decimals = 3,
}: {
  redshift: number | null | undefined;
  uncertainty?: number | null | undefined;
  decimals?: number;
}) {
  if (redshift == null) return <>{formatNumber(null)}</>;
  return (
    <span style={{ display: 'inline-flex', gap: 7, alignItems: 'center', whiteSpace: 'nowrap' }}>
      <span
        aria-hidden="true"
        style={{ width: 10, height: 10, borderRadius: 2, background: redshiftColour(redshift), flex: 'none' }}
      />
      {formatNumber(redshift, { decimals })}
      {uncertainty != null && uncertainty > 0 && (
        <span style={{ color: 'var(--fw-palette-text-secondary)' }}>
          ± {formatNumber(uncertainty, { significant: 1 })}
        </span>
      )}
    </span>
  );
}
