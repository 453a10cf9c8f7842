import type { BandLight } from '@faintward/contracts/light-report';

/** Reasons that mean: nothing is known, not: no light. */
const unknownCodes = ['spectrumEnds', 'noDistance'];

/** How much is known of a band: a magnitude, that there is no light, or nothing, as where the spectrum ends before it. */
export function bandState(band: Pick<BandLight, 'magnitudeAb' | 'reason'>): 'light' | 'dark' | 'unknown' {
  if (band.magnitudeAb !== null) return 'light';
  return band.reason === null || unknownCodes.includes(band.reason.code) ? 'unknown' : 'dark';
}
