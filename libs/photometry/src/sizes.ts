import { requirePositive } from './domain.js';

/** Angle in arcsec of a proper transverse size in kpc. `kpcPerArcsec` comes from the cosmology at the redshift. */
export function arcsecFromKpc(sizeKpc: number, kpcPerArcsec: number): number {
  requirePositive('kpcPerArcsec', kpcPerArcsec);
  return sizeKpc / kpcPerArcsec;
}

/** Proper transverse size in kpc of an angle in arcsec. */
export function kpcFromArcsec(sizeArcsec: number, kpcPerArcsec: number): number {
  requirePositive('kpcPerArcsec', kpcPerArcsec);
  return sizeArcsec * kpcPerArcsec;
}
