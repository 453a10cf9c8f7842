/** What a signal-to-noise ratio is counted in: "per pixel". */
export const perWords = {
  aperture: 'aperture',
  arcsec2: 'square arcsecond',
  pixel: 'pixel',
  resolutionElement: 'resolution element',
} as const;

/** What most of the noise comes from. */
export const limitWords = {
  source: 'the source',
  sky: 'the sky',
  dark: 'dark current',
  readNoise: 'read-out',
} as const;
