import type { FieldError } from '@faintward/contracts/errors';
import type { RedshiftUncertainty } from '@faintward/contracts/light';
import { OutOfDomainError, redshiftDistribution } from '@faintward/photometry';

/** Width from the 16th to the 84th percentile below which a redshift counts as known: densities would be numbers beyond use. */
const LEAST_WIDTH = 1e-9;
const CHECKED_POINTS = 16;

/** What keeps a distribution from being drawn from, though it has the form of one. Paths begin with `prefix`. */
export function uncertaintyFaults(
  { redshift, redshiftUncertainty }: { redshift: number; redshiftUncertainty: RedshiftUncertainty | null },
  prefix = '',
): FieldError[] {
  if (redshiftUncertainty === null) return [];
  try {
    const { quantile, curve } = redshiftDistribution(redshift, redshiftUncertainty);
    const isWide = quantile(0.84) - quantile(0.16) >= LEAST_WIDTH;
    // Percentiles of next to nothing can be told apart, while a density that is cut at 0 beside them cannot be drawn.
    if (isWide && curve(CHECKED_POINTS).densities.every(Number.isFinite)) return [];
    return [
      {
        path: `${prefix}redshiftUncertainty`,
        message: `This distribution is narrower than about ${LEAST_WIDTH}: leave the uncertainty out of a redshift that is known so well.`,
      },
    ];
  } catch (error) {
    if (!(error instanceof OutOfDomainError)) throw error;
    return [{ path: `${prefix}redshiftUncertainty.${error.field}`, message: `Must be ${error.allowed}.` }];
  }
}
