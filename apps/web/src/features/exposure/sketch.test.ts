import { describe, expect, it } from 'vitest';
import { id } from '../../testing/examples';
import { fieldOf, readSketch, toRequest, unknownInAddress, writeSketch, type Sketch } from './sketch';

const sketchOf = (address: string): Sketch => readSketch(new URLSearchParams(address));

describe('the address of a sketch', () => {
  it('is empty for what the page opens with, and gives back what was typed', () => {
    expect(writeSketch(sketchOf('')).toString()).toBe('');
    const typed: Sketch = {
      ...sketchOf(''),
      light: 'starFormationRate',
      rate: '8',
      tracer: 'lymanAlpha',
      escape: '0.1',
      galacticDust: '0.03',
      withGalacticDust: 'yes',
      derivedWith: 'own',
      derivedOm: '0.27',
      extent: 'typical',
      snr: '7',
    };
    expect(readSketch(writeSketch(typed))).toEqual(typed);
    expect(unknownInAddress(writeSketch(typed))).toEqual([]);
  });

  it('of before still says what it said', () => {
    const sketch = sketchOf('light=apparentMagnitude&magnitude=25&band=J&magnification=4&extent=sersic&radius=1.2');
    expect(toRequest({ ...sketch, mode: id(5) }).request?.target).toMatchObject({
      light: { magnitude: 25, bandId: 'J', magnification: 4, includes: { lensing: false } },
      extent: { kind: 'sersic', halfLightRadius: 1.2, unit: 'kpc' },
    });
  });

  it('does not turn a magnification that the value contains into one on top of it', () => {
    const typed: Sketch = { ...sketchOf(''), light: 'apparentMagnitude', magnification: '4' };
    const again = readSketch(writeSketch(typed));
    expect(toRequest({ ...again, mode: id(5) }).request?.target.light.includes.lensing).toBe(true);
  });

  it('names what it cannot read, and opens all the same', () => {
    const address = new URLSearchParams('light=banana&redshift=3.1&colour=red');
    expect(unknownInAddress(address)).toEqual(['light', 'colour']);
    expect(readSketch(address)).toMatchObject({ light: 'absoluteMagnitude', redshift: '3.1' });
  });
});

describe('the request of a sketch', () => {
  it('checks the rest of the form while the light cannot be read', () => {
    const { request, errors } = toRequest({ ...sketchOf('absolute=&snr=-1'), mode: id(5) });
    expect(request).toBeUndefined();
    expect(errors.absolute).toBe('Needed.');
    expect(errors.snr).toBeDefined();
  });

  it('finds the field of what the server refuses', () => {
    expect(fieldOf('target.light.magnitude', sketchOf(''))).toBe('absolute');
    expect(fieldOf('target.extent.halfLightRadius', sketchOf(''))).toBe('radius');
    expect(fieldOf('conditions.airmass', sketchOf(''))).toBe('airmass');
  });
});
