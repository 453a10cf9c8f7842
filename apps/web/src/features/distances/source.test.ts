import { expect, it } from 'vitest';
import { readSource, sourceFieldOf, toLightRequest, writeSource } from './source';

it('opens with an example that can be asked at once', () => {
  const { request, errors } = toLightRequest(readSource(new URLSearchParams()), null);
  expect(errors).toEqual({});
  expect(request).toMatchObject({
    redshift: 7,
    cosmology: 'planck18',
    light: { kind: 'absoluteMagnitude', magnitude: -21, restWavelengthNm: 150 },
    extent: { kind: 'point' },
    bandId: null,
    seeingArcsec: 0.8,
  });
});

it('a link holds everything that was typed', () => {
  const address =
    'light=apparentMagnitude&magnitude=25.1&band=J&redshift=6.9&uncertainty=gaussian&sigmaZ=0.3&ledgerBand=H';
  const state = readSource(new URLSearchParams(address));
  expect(readSource(writeSource(state))).toEqual(state);
  expect(toLightRequest(state, null).request).toMatchObject({
    light: { kind: 'apparentMagnitude', magnitude: 25.1, bandId: 'J' },
    redshiftUncertainty: { kind: 'gaussian', sigma: 0.3 },
    bandId: 'H',
  });
});

it('an old or mistyped link still opens', () => {
  expect(readSource(new URLSearchParams('light=hearsay&ledgerBand=Q&cosmology=mine')).light).toBe('absoluteMagnitude');
});

it('says which field is wrong', () => {
  const state = { ...readSource(new URLSearchParams()), redshift: 'seven', seeing: '0' };
  expect(toLightRequest(state, null).errors.redshift).toBeDefined();
  expect(toLightRequest({ ...state, redshift: '7' }, null).errors.seeing).toBeDefined();
  expect(
    toLightRequest({ ...state, redshift: '7', seeing: '1', uncertainty: 'table' }, null).errors.table,
  ).toBeDefined();
  expect(sourceFieldOf('apertureRadiusArcsec', state, null)).toBe('aperture');
});
