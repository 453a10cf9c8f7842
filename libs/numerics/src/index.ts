export { NumericalDomainError, NotConvergedError, RootNotBracketedError } from './errors.js';
export { erf, erfc } from './error-function.js';
export { inverseRegularizedGammaP, logGamma, regularizedGammaP, regularizedGammaQ } from './gamma.js';
export { gaussLegendre, gaussLegendreRule, integrateAdaptively } from './quadrature.js';
export type { AdaptiveOptions, QuadratureRule } from './quadrature.js';
export { findRoot, findRootWithDerivative } from './roots.js';
export type { RootOptions } from './roots.js';
