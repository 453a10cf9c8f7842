/** The sky as the reference data of the repository describe it: libraries read no files, so their tests do. */
import { createExtinctionCurves, extinctionCurveOf } from '@faintward/exposure/sky/extinction';
import { createSkyModel } from '@faintward/exposure/sky/sky-brightness';
import { createBands } from '@faintward/photometry';
import { photometryFiles } from './photometry-files.js';

export const files = photometryFiles();
export const bands = createBands(files.bands);
export const sky = createSkyModel(files, bands);
export const extinction = extinctionCurveOf(createExtinctionCurves(files.extinction), 'desert2600m');
