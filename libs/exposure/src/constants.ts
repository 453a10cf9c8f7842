import type { Constant } from '@faintward/photometry';

/** Changes whenever the same input could give another answer. Stored beside every number. */
export const ENGINE_VERSION = '2.0.0';

/** Radius of best S/N against a background, for a Gaussian image, in units of its FWHM: 1 + 2c x² = e^(c x²), c = 4 ln 2. */
export const OPTIMUM_RADIUS_OVER_FWHM = 0.673_172_911_275_977_8;

export const DIGITISATION_ERROR_ADU: Constant = {
  name: 'rms error of rounding to whole digital units',
  symbol: 'σ_f',
  value: 0.289,
  unit: 'ADU',
  reference: 'Merline & Howell 1995, Experimental Astronomy 6, 163 (1/√12, rounded as printed there)',
};

export const SATURATION_FRACTION: Constant = {
  name: 'part of the full well that is used',
  symbol: '',
  value: 0.7,
  unit: '',
  reference: 'common practice: leaves room for a nonlinear top end and for better seeing than asked',
};

export const READ_NOISE_COST: Constant = {
  name: 'loss of S/N to read noise that is accepted when the length of an exposure is free',
  symbol: 'p',
  value: 0.05,
  unit: '',
  reference: 'common practice',
};

export const THIN_CLOUD: Constant = {
  name: 'attenuation by thin cloud',
  symbol: '',
  value: 0.3,
  unit: 'mag',
  reference: 'common practice: grey, source only; the sky behind stays as bright as when clear',
};

/** Shortest series in which a frame's sky can be taken from the others. */
export const DITHER_MINIMUM_COUNT: Constant = {
  name: 'fewest exposures for a sky frame from the series itself',
  symbol: '',
  value: 5,
  unit: '',
  reference: 'common practice',
};

/** Fewer exposures than this cannot outvote a cosmic ray in one of them. */
export const COSMIC_RAY_MINIMUM_COUNT: Constant = {
  name: 'fewest exposures to reject cosmic rays',
  symbol: '',
  value: 3,
  unit: '',
  reference: 'common practice',
};

export const MAXIMUM_EXPOSURE_COUNT: Constant = {
  name: 'largest number of exposures that is still called feasible',
  symbol: '',
  value: 20_000,
  unit: '',
  reference: 'choice of this library',
};

/** 182 nights of ten hours. */
export const SEMESTER_NIGHT_SECONDS: Constant = {
  name: 'all the night hours of half a year',
  symbol: '',
  value: 182 * 10 * 3600,
  unit: 's',
  reference: 'choice of this library: 182 nights of ten hours',
};

export const KOLMOGOROV_FWHM_COEFFICIENT: Constant = {
  name: 'seeing FWHM times Fried parameter over wavelength',
  symbol: '',
  value: 0.976,
  unit: '',
  reference: 'Fried 1966, JOSA 56, 1372; Roddier 1981, Progress in Optics 19, 281 (cited from memory)',
};

export const ARCSEC_PER_RADIAN = 648_000 / Math.PI;
