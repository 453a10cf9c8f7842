import { redshiftAnchors } from './tokens';

const steps = redshiftAnchors.map((_anchor, index) => `var(--fw-palette-faintward-z${index})`);

/**
 * The colour of a redshift on the one ramp that the whole application uses, as a CSS colour that follows the scheme.
 * Below the first anchor and above the last the ramp stands still. Never shown without the number beside it.
 */
export function redshiftColour(redshift: number): string {
  if (!Number.isFinite(redshift) || redshift <= redshiftAnchors[0]) return steps[0]!;
  const upper = redshiftAnchors.findIndex((anchor) => redshift < anchor);
  if (upper === -1) return steps[steps.length - 1]!;
  const from = redshiftAnchors[upper - 1]!;
  const share = Math.round((100 * (redshift - from)) / (redshiftAnchors[upper]! - from));
  if (share === 0) return steps[upper - 1]!;
  return `color-mix(in oklab, ${steps[upper]} ${share}%, ${steps[upper - 1]})`;
}
