/** A number with everything needed to trust it. */
export interface PhysicalConstant {
  readonly name: string;
  readonly symbol: string;
  readonly value: number;
  readonly unit: string;
  /** Standard uncertainty in the same unit; 0 for a defined value. */
  readonly uncertainty: number;
  readonly reference: string;
}

const SI = 'BIPM, The International System of Units, 9th edition (2019)';
const CODATA = 'CODATA 2018: Tiesinga et al. 2021, Rev. Mod. Phys. 93, 025010';
const IAU_2015 = 'IAU 2015 Resolution B2 with IAU 2012 Resolution B2';

/** Speed of light in vacuum. */
export const SPEED_OF_LIGHT: PhysicalConstant = {
  name: 'speed of light in vacuum',
  symbol: 'c',
  value: 299792.458,
  unit: 'km/s',
  uncertainty: 0,
  reference: SI,
};

/** Megaparsec: 10⁶ · 648000/π astronomical units of 149597870700 m. */
export const MEGAPARSEC: PhysicalConstant = {
  name: 'megaparsec',
  symbol: 'Mpc',
  value: (648000e6 * 149597870.7) / Math.PI,
  unit: 'km',
  uncertainty: 0,
  reference: IAU_2015,
};

/** A thousand million Julian years of 365.25 days of 86400 s. */
export const GIGAYEAR: PhysicalConstant = {
  name: 'gigayear (Julian)',
  symbol: 'Gyr',
  value: 3.15576e16,
  unit: 's',
  uncertainty: 0,
  reference: 'IAU Style Manual (1989), Julian year of 365.25 days',
};

/** Newtonian constant of gravitation. */
export const GRAVITATIONAL_CONSTANT: PhysicalConstant = {
  name: 'Newtonian constant of gravitation',
  symbol: 'G',
  value: 6.6743e-11,
  unit: 'm³ kg⁻¹ s⁻²',
  uncertainty: 1.5e-15,
  reference: CODATA,
};

/** Stefan–Boltzmann constant: 2π⁵k⁴/(15h³c²) with the exact SI values of k, h and c. */
export const STEFAN_BOLTZMANN: PhysicalConstant = {
  name: 'Stefan–Boltzmann constant',
  symbol: 'σ',
  value: (2 * Math.PI ** 5 * 1.380649e-23 ** 4) / (15 * 6.62607015e-34 ** 3 * 299792458 ** 2),
  unit: 'W m⁻² K⁻⁴',
  uncertainty: 0,
  reference: SI,
};

/** Boltzmann constant. */
export const BOLTZMANN: PhysicalConstant = {
  name: 'Boltzmann constant',
  symbol: 'k',
  value: 1.380649e-23 / 1.602176634e-19,
  unit: 'eV/K',
  uncertainty: 0,
  reference: SI,
};

/** Neutrino temperature over photon temperature after electron–positron annihilation, (4/11)^(1/3). */
export const NEUTRINO_TEMPERATURE_RATIO: PhysicalConstant = {
  name: 'neutrino to photon temperature ratio',
  symbol: 'T_ν/T_γ',
  value: Math.cbrt(4 / 11),
  unit: '1',
  uncertainty: 0,
  reference: 'Weinberg 2008, Cosmology, section 3.1 (instantaneous decoupling)',
};

/** Energy density of one massless neutrino species over that of the photons, (7/8)(4/11)^(4/3) = 0.22710731766. */
export const NEUTRINO_DENSITY_RATIO: PhysicalConstant = {
  name: 'density of one massless neutrino species over that of photons',
  symbol: 'ρ_ν/ρ_γ',
  value: (7 / 8) * Math.cbrt(4 / 11) ** 4,
  unit: '1',
  uncertainty: 0,
  reference: 'Komatsu et al. 2011, ApJS 192, 18, text of section 3.3',
};
