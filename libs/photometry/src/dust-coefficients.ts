/**
 * Coefficients of three published laws of dust, with wavelengths as x = 1/λ in µm⁻¹ where not said otherwise, and
 * polynomials from the constant term upwards. They stand here and nowhere else, beside the formulas of `dust-laws.ts` without
 * which they mean nothing; `seed/reference/dust-laws.json` says where they come from.
 */
export const DUST_LAW_COEFFICIENTS = {
  /** Cardelli, Clayton & Mathis 1989: A(λ)/A(V) = a(x) + b(x)/R_V, each part below its bound in x. */
  ccm1989: {
    validInverseMicron: [0.3, 10],
    infrared: { below: 1.1, power: 1.61, a: 0.574, b: -0.527 },
    optical: {
      below: 3.3,
      origin: 1.82,
      a: [1, 0.17699, -0.50447, -0.02427, 0.72085, 0.01979, -0.7753, 0.32999],
      b: [0, 1.41338, 2.28305, 1.07233, -5.38434, -0.62251, 5.3026, -2.09002],
    },
    ultraviolet: {
      below: 8,
      a: { constant: 1.752, slope: -0.316, bumpHeight: -0.104, bumpCentre: 4.67, bumpWidth: 0.341 },
      b: { constant: -3.09, slope: 1.825, bumpHeight: 1.206, bumpCentre: 4.62, bumpWidth: 0.263 },
      curvature: { above: 5.9, a: [0, 0, -0.04473, -0.009779], b: [0, 0, 0.213, 0.1207] },
    },
    farUltraviolet: { origin: 8, a: [-1.073, -0.628, 0.137, -0.07], b: [13.67, 4.257, -0.42, 0.374] },
  },
  /**
   * Fitzpatrick 1999: shortward of 270 nm a sum of line, bump and curvature; longward a natural cubic spline in x through
   * x = 0, the anchors, and that sum at its own anchors. All are A(λ)/E(B−V).
   */
  fitzpatrick1999: {
    validInverseMicron: [0.3, 10],
    splineFromNm: 270,
    infraredAnchors: [
      { wavelengthNm: 2650, atStandard: 0.265 },
      { wavelengthNm: 1220, atStandard: 0.829 },
    ],
    standardTotalToSelective: 3.1,
    opticalAnchors: [
      { wavelengthNm: 600, inTotalToSelective: [-0.422809, 1.0027, 2.13572e-4] },
      { wavelengthNm: 547, inTotalToSelective: [-0.051354, 1.00216, -7.35778e-5] },
      { wavelengthNm: 467, inTotalToSelective: [0.700127, 1.00184, -3.32598e-5] },
      { wavelengthNm: 411, inTotalToSelective: [1.19456, 1.01707, -5.46959e-3, 7.97809e-4, -4.45636e-5] },
    ],
    ultravioletAnchorsNm: [270, 260],
    ultraviolet: {
      slopeInInverseTotalToSelective: [-0.824, 4.717],
      constantInSlope: [2.03, -3.007],
      bumpHeight: 3.23,
      bumpCentre: 4.596,
      bumpWidth: 0.99,
      curvatureHeight: 0.41,
      curvatureAbove: 5.9,
      curvature: [0, 0, 0.5392, 0.05644],
    },
  },
  /** Calzetti et al. 2000: A(λ)/E(B−V) = scale · p(x) + R_V, with one polynomial on each side of 630 nm. */
  calzetti2000: {
    validNm: [120, 2200],
    scale: 2.659,
    splitNm: 630,
    shorter: [-2.156, 1.509, -0.198, 0.011],
    longer: [-1.857, 1.04],
  },
} as const;
