export { BAND_IDS } from './bands.js';
