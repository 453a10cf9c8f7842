/**
 * Geometry of a space of constant curvature, in units of the Hubble distance. `q` is Ωk d² with d the comoving distance along
 * the line of sight: positive in an open, negative in a closed space. All functions are smooth through q = 0.
 */

/** Below this |q| the closed forms cancel and the power series, cut where shown, is exact to rounding. */
const SERIES_LIMIT = 0.05;

/** Transverse over line-of-sight comoving distance: sinh √q/√q, or sin √−q/√−q. Hogg 1999, eq. 16. */
export function transverseFactor(q: number): number {
  if (Math.abs(q) < SERIES_LIMIT) {
    return 1 + (q / 6) * (1 + (q / 20) * (1 + (q / 42) * (1 + (q / 72) * (1 + (q / 110) * (1 + q / 156)))));
  }
  if (q > 0) return Math.sinh(Math.sqrt(q)) / Math.sqrt(q);
  return Math.sin(Math.sqrt(-q)) / Math.sqrt(-q);
}

/** Change of the transverse with the line-of-sight comoving distance: cosh √q, or cos √−q. */
export function transverseSlope(q: number): number {
  return q >= 0 ? Math.cosh(Math.sqrt(q)) : Math.cos(Math.sqrt(-q));
}

/**
 * Volume of a sphere over 4πd³: 1/3 in flat space, else [sinh 2√q − 2√q]/(4 q^(3/2)) or its trigonometric twin.
 *
 * Hogg 1999, eq. 29, is the same volume written with the arcsine of the transverse distance, which is ambiguous beyond a
 * quarter of the way around a closed universe; this form is not.
 */
export function volumeFactor(q: number): number {
  if (Math.abs(q) < 0.5) {
    // Σ 4^k q^k · 2/((2k+3)!)·… written as a running product: term ratio 4q/((2k+2)(2k+3)).
    let term = 1 / 3;
    let sum = term;
    for (let k = 1; k < 20; k++) {
      term *= (4 * q) / ((2 * k + 2) * (2 * k + 3));
      sum += term;
      if (Math.abs(term) < 1e-18) break;
    }
    return sum;
  }
  const t = Math.sqrt(Math.abs(q));
  return q > 0 ? (Math.sinh(2 * t) - 2 * t) / (4 * t ** 3) : (2 * t - Math.sin(2 * t)) / (4 * t ** 3);
}
