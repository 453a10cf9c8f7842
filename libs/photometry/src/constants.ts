/** A number with its passport. */
export interface Constant {
  readonly name: string;
  readonly symbol: string;
  readonly value: number;
  readonly unit: string;
  readonly reference: string;
}

export const SPEED_OF_LIGHT: Constant = {
  name: 'speed of light in vacuum',
  symbol: 'c',
  value: 299_792_458,
  unit: 'm s^-1',
  reference: 'exact by the definition of the metre (SI 2019)',
};

export const PLANCK_CONSTANT: Constant = {
  name: 'Planck constant',
  symbol: 'h',
  value: 6.626_070_15e-34,
  unit: 'J s',
  reference: 'exact by the definition of the kilogram (SI 2019)',
};

export const PARSEC: Constant = {
  name: 'parsec',
  symbol: 'pc',
  value: 3.085_677_581_491_367e16,
  unit: 'm',
  reference: 'IAU 2015 Resolution B2: 648000/pi astronomical units; astronomical unit of IAU 2012 Resolution B2',
};

/**
 * The constant of the AB system: m = −2.5 log10(f_ν / erg s⁻¹ cm⁻² Hz⁻¹) − 48.60.
 *
 * This is the definition used everywhere here. It puts AB = 0 at 3630.78 Jy; the often quoted 3631 Jy is a rounding
 * of that and differs by 6.6e-5 mag, enough to spoil a comparison to 1e-9.
 */
export const AB_CONSTANT: Constant = {
  name: 'AB magnitude constant',
  symbol: '',
  value: 48.6,
  unit: 'mag',
  reference: 'Oke & Gunn 1983, ApJ 266, 713 (cited from memory)',
};

/** 1 Jy in erg s⁻¹ cm⁻² Hz⁻¹. */
export const JANSKY_CGS: Constant = {
  name: 'jansky',
  symbol: 'Jy',
  value: 1e-23,
  unit: 'erg s^-1 cm^-2 Hz^-1',
  reference: 'definition',
};

/** Centimetres in a megaparsec. */
export const CM_PER_MPC = PARSEC.value * 1e8;
/** Speed of light in km/s. */
export const SPEED_OF_LIGHT_KM_S = SPEED_OF_LIGHT.value / 1000;
