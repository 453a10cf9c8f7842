import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { distanceRows } from './batch.js';
import { createCosmology, MAX_REDSHIFT, type Cosmology } from './cosmology.js';
import { AntipodeError, InvalidCosmologyError, NoBigBangError, NoSolutionError, OutOfDomainError } from './errors.js';
import { PARAMETER_RANGES, type CosmologyParameters } from './parameters.js';

const relative = (value: number, expected: number): number => Math.abs(value / expected - 1);

/** Models all over the allowed space that do have a big bang; radiation, massive neutrinos and curvature included. */
const anyModel: fc.Arbitrary<Cosmology> = fc
  .record({
    hubbleConstantKmSMpc: fc.double({ min: 40, max: 110, noNaN: true }),
    omegaMatter: fc.double({ min: 0.05, max: 1.2, noNaN: true }),
    omegaDarkEnergy: fc.option(fc.double({ min: -0.3, max: 1.1, noNaN: true }), { nil: undefined }),
    w0: fc.double({ min: -1.5, max: -0.5, noNaN: true }),
    wa: fc.double({ min: -0.5, max: 0.4, noNaN: true }),
    cmbTemperatureK: fc.constantFrom(0, 2.7255, 10),
    effectiveNeutrinoCount: fc.constantFrom(0, 3.046, 4.2),
    neutrinoMassesEv: fc.constantFrom([], [0.06], [0, 0.3, 1]),
  })
  .map((parameters) => {
    try {
      return createCosmology(parameters);
    } catch (error) {
      if (error instanceof NoBigBangError) return undefined;
      throw error;
    }
  })
  .filter((model) => model !== undefined);

const sourceRedshift = fc.double({ min: -6, max: Math.log10(30), noNaN: true }).map((exponent) => 10 ** exponent);

/** Random closed models may have their antipode in reach; those properties speak of the space before it. */
function reaches(model: Cosmology, redshift: number): boolean {
  const antipode = model.antipodeRedshift();
  return antipode === undefined || redshift < 0.99 * antipode;
}

describe('whatever the model', () => {
  it('distances are related as light is: D_L = (1+z)² D_A, and the modulus and scales follow', () => {
    fc.assert(
      fc.property(anyModel, sourceRedshift, (model, z) => {
        fc.pre(reaches(model, z));
        const luminosity = model.luminosityDistanceMpc(z);
        expect(relative(luminosity, (1 + z) ** 2 * model.angularDiameterDistanceMpc(z))).toBeLessThan(1e-14);
        expect(Math.abs(model.distanceModulusMag(z)! - (5 * Math.log10(luminosity) + 25))).toBeLessThan(1e-12);
        expect(relative(model.comovingKpcPerArcsec(z)!, (1 + z) * model.kpcPerArcsec(z)!)).toBeLessThan(1e-14);
        expect(relative(model.arcsecPerKpc(z)! * model.kpcPerArcsec(z)!, 1)).toBeLessThan(1e-15);
      }),
    );
  });

  it('comoving distance and lookback time grow with redshift, age falls', () => {
    fc.assert(
      fc.property(anyModel, sourceRedshift, sourceRedshift, (model, a, b) => {
        const [near, far] = a < b ? [a, b] : [b, a];
        fc.pre(far > near * (1 + 1e-9));
        expect(model.comovingDistanceMpc(far)).toBeGreaterThan(model.comovingDistanceMpc(near));
        expect(model.lookbackTimeGyr(far)).toBeGreaterThan(model.lookbackTimeGyr(near));
        expect(model.ageGyr(far)).toBeLessThan(model.ageGyr(near) * (1 + 1e-13));
      }),
    );
  });

  it('age and lookback time add up to the age today', () => {
    fc.assert(
      fc.property(anyModel, sourceRedshift, (model, z) => {
        expect(relative(model.ageGyr(z) + model.lookbackTimeGyr(z), model.ageGyr(0))).toBeLessThan(1e-12);
      }),
    );
  });

  it('the parts of the density add up to one at every redshift', () => {
    fc.assert(
      fc.property(anyModel, sourceRedshift, (model, z) => {
        const parts = [
          model.omegaMatterAt(z),
          model.omegaDarkEnergyAt(z),
          model.omegaCurvatureAt(z),
          model.omegaPhotonsAt(z),
          model.omegaNeutrinosAt(z),
        ];
        const size = parts.reduce((sum, part) => sum + Math.abs(part), 0);
        expect(Math.abs(parts.reduce((sum, part) => sum + part, 0) - 1)).toBeLessThan(1e-13 * size);
      }),
    );
  });

  it('distances and times scale as 1/H0 where there is no radiation', () => {
    fc.assert(
      fc.property(sourceRedshift, fc.double({ min: 40, max: 110, noNaN: true }), (z, hubble) => {
        const base = { omegaMatter: 0.3, omegaDarkEnergy: 0.6 };
        const one = createCosmology({ ...base, hubbleConstantKmSMpc: 70 });
        const other = createCosmology({ ...base, hubbleConstantKmSMpc: hubble });
        expect(relative(other.kpcPerArcsec(z)! * hubble, one.kpcPerArcsec(z)! * 70)).toBeLessThan(1e-13);
        expect(relative(other.ageGyr(z) * hubble, one.ageGyr(z) * 70)).toBeLessThan(1e-13);
      }),
    );
  });

  it('every inverse brings back the redshift', () => {
    fc.assert(
      fc.property(anyModel, sourceRedshift, (model, z) => {
        fc.pre(reaches(model, z));
        expect(relative(model.redshiftAtComovingDistanceMpc(model.comovingDistanceMpc(z)), z)).toBeLessThan(1e-11);
        expect(relative(model.redshiftAtLookbackTimeGyr(model.lookbackTimeGyr(z)), z)).toBeLessThan(1e-11);
        // Close to today an age is today's age minus little: what rounding took from it cannot come back.
        const lost = (1e-15 * model.ageGyr(0)) / model.lookbackTimeGyr(z);
        expect(relative(model.redshiftAtAgeGyr(model.ageGyr(z)), z)).toBeLessThan(1e-11 + 20 * lost);
        const scale = model.kpcPerArcsec(z)!;
        const both = model.redshiftsAtKpcPerArcsec(scale);
        // Near redshift 0 a double holds 1 + z to no more than its own rounding, which is 1e-16/z of z.
        const held = 1e-11 + 1e-16 / z;
        for (const found of both) expect(relative(model.kpcPerArcsec(found)!, scale)).toBeLessThan(held);
        expect(Math.min(...both.map((found) => relative(found, z)))).toBeLessThan(1e-6);
      }),
      { numRuns: 60 },
    );
  });

  it('the luminosity-distance inverse has that luminosity distance, at the nearest such redshift', () => {
    fc.assert(
      fc.property(anyModel, sourceRedshift, (model, z) => {
        fc.pre(reaches(model, z));
        const distance = model.luminosityDistanceMpc(z);
        const found = model.redshiftAtLuminosityDistanceMpc(distance);
        expect(found).toBeLessThan(z * (1 + 1e-6));
        expect(relative(model.luminosityDistanceMpc(found), distance)).toBeLessThan(1e-11);
      }),
      { numRuns: 60 },
    );
  });

  it('the slope of the modulus is the slope of the modulus', () => {
    fc.assert(
      fc.property(anyModel, fc.double({ min: 0.05, max: 15, noNaN: true }), (model, z) => {
        fc.pre(reaches(model, z * 1.01));
        const step = 1e-5 * z;
        const numeric = (model.distanceModulusMag(z + step)! - model.distanceModulusMag(z - step)!) / (2 * step);
        expect(Math.abs(numeric - model.distanceModulusSlopeMag(z)!)).toBeLessThan(1e-6 * (1 + 1 / z));
      }),
    );
  });

  it('a volume between two redshifts is the difference of the volumes, and thin shells are not lost', () => {
    fc.assert(
      fc.property(anyModel, fc.double({ min: 0.1, max: 10, noNaN: true }), (model, z) => {
        const outer = model.comovingVolumeMpc3(z * 1.5);
        const between = model.comovingVolumeBetweenMpc3(z, z * 1.5);
        expect(Math.abs(between - (outer - model.comovingVolumeMpc3(z)))).toBeLessThan(1e-11 * outer);
        fc.pre(reaches(model, z * 1.001));
        const thickness = 1e-9 * z;
        const shell = model.comovingVolumeBetweenMpc3(z, z + thickness) / (z + thickness - z);
        expect(relative(shell, 4 * Math.PI * model.differentialComovingVolumeMpc3Sr(z))).toBeLessThan(1e-6);
      }),
    );
  });
});

describe('curvature', () => {
  it('closed and open models go over into the flat one without a step', () => {
    const flat = createCosmology({ hubbleConstantKmSMpc: 70, omegaMatter: 0.3 });
    for (const excess of [1e-6, -1e-6, 1e-9, -1e-9, 1e-12, -1e-12, 1e-15]) {
      const bent = createCosmology({ hubbleConstantKmSMpc: 70, omegaMatter: 0.3, omegaDarkEnergy: 0.7 + excess });
      for (const z of [1e-6, 0.1, 1, 10, 1100]) {
        const tolerance = 10 * Math.abs(excess) + 1e-14;
        expect(relative(bent.luminosityDistanceMpc(z), flat.luminosityDistanceMpc(z))).toBeLessThan(tolerance);
        expect(relative(bent.comovingVolumeMpc3(z), flat.comovingVolumeMpc3(z))).toBeLessThan(2 * tolerance);
      }
    }
  });

  it('a volume nearby is that of a Euclidean sphere of the comoving radius, whatever the curvature', () => {
    for (const omegaDarkEnergy of [0, 0.6, 0.9]) {
      const model = createCosmology({ hubbleConstantKmSMpc: 70, omegaMatter: 0.3, omegaDarkEnergy });
      for (const z of [1e-8, 1e-6, 1e-4]) {
        const radius = model.comovingDistanceMpc(z);
        const q = model.omegaCurvature * (radius / model.hubbleDistanceMpc) ** 2;
        // The first correction is q/5; the next is of order q².
        const sphere = ((4 * Math.PI) / 3) * radius ** 3 * (1 + q / 5);
        expect(relative(model.comovingVolumeMpc3(z), sphere)).toBeLessThan(1e-14 + q * q);
      }
    }
  });

  it('leaving dark energy out makes the model exactly flat', () => {
    expect(createCosmology('planck18').omegaCurvature).toBe(0);
  });

  /** Almost all dark energy and closed: its antipode lies at a modest redshift. */
  const closed = createCosmology({ hubbleConstantKmSMpc: 70, omegaMatter: 0.2, omegaDarkEnergy: 1.5 });

  it('transverse distances stop at the antipode of a closed universe, line-of-sight ones do not', () => {
    const antipode = closed.antipodeRedshift()!;
    expect(antipode).toBeGreaterThan(1);
    const halfway = (Math.PI / Math.sqrt(-closed.omegaCurvature)) * closed.hubbleDistanceMpc;
    expect(relative(closed.comovingDistanceMpc(antipode), halfway)).toBeLessThan(1e-13);
    expect(closed.transverseComovingDistanceMpc(antipode * 0.999)).toBeGreaterThan(0);
    expect(() => closed.luminosityDistanceMpc(antipode * 1.001)).toThrow(AntipodeError);
    expect(() => closed.distanceModulusMag(antipode * 1.001)).toThrow(OutOfDomainError);
    expect(closed.comovingDistanceMpc(antipode * 1.001)).toBeGreaterThan(halfway);
    expect(closed.comovingVolumeMpc3(antipode * 1.001)).toBeGreaterThan(closed.comovingVolumeMpc3(antipode * 0.999));
  });

  it('the volume up to the antipode is that of the whole hypersphere, 2π² R³', () => {
    const radius = closed.hubbleDistanceMpc / Math.sqrt(-closed.omegaCurvature);
    const volume = closed.comovingVolumeMpc3(closed.antipodeRedshift()!);
    expect(relative(volume, 2 * Math.PI ** 2 * radius ** 3)).toBeLessThan(1e-12);
  });

  it('a luminosity distance that turns back is answered on the near side', () => {
    const beyondTurn = closed.antipodeRedshift()! * 0.995;
    const distance = closed.luminosityDistanceMpc(beyondTurn);
    const near = closed.redshiftAtLuminosityDistanceMpc(distance);
    expect(near).toBeLessThan(beyondTurn * 0.9);
    expect(relative(closed.luminosityDistanceMpc(near), distance)).toBeLessThan(1e-12);
    expect(() => closed.redshiftAtLuminosityDistanceMpc(1e9)).toThrow(NoSolutionError);
  });

  it('between two redshifts, closed models obey the sine rule and refuse the antipode of the lens', () => {
    const [z1, z2] = [0.3, 0.8];
    const radius = closed.hubbleDistanceMpc / Math.sqrt(-closed.omegaCurvature);
    const angle = (closed.comovingDistanceMpc(z2) - closed.comovingDistanceMpc(z1)) / radius;
    const expected = (radius * Math.sin(angle)) / (1 + z2);
    expect(relative(closed.angularDiameterDistanceBetweenMpc(z1, z2), expected)).toBeLessThan(1e-13);
    expect(closed.angularDiameterDistanceBetweenMpc(z1, z1)).toBe(0);
    const fromHere = closed.angularDiameterDistanceBetweenMpc(0, z2);
    expect(relative(fromHere, closed.angularDiameterDistanceMpc(z2))).toBeLessThan(1e-15);
    // From further out the antipode lies further out too, so this pair is allowed though z2 is not seen from here.
    const antipode = closed.antipodeRedshift()!;
    expect(closed.angularDiameterDistanceBetweenMpc(0.5, antipode * 1.001)).toBeGreaterThan(0);
    expect(() => closed.angularDiameterDistanceBetweenMpc(0.01, 9000)).toThrow(AntipodeError);
    expect(() => closed.angularDiameterDistanceBetweenMpc(1, 0.9)).toThrow(OutOfDomainError);
  });
});

describe('the ends of the redshift range', () => {
  const model = createCosmology('planck18');

  it('at redshift zero, distances vanish and what has no finite value is undefined', () => {
    expect(model.expansionRateRatio(0)).toBeCloseTo(1, 15);
    expect(model.comovingDistanceMpc(0)).toBe(0);
    expect(model.luminosityDistanceMpc(0)).toBe(0);
    expect(model.angularDiameterDistanceMpc(0)).toBe(0);
    expect(model.comovingVolumeMpc3(0)).toBe(0);
    expect(model.lookbackTimeGyr(0)).toBe(0);
    expect(model.distanceModulusMag(0)).toBeUndefined();
    expect(model.distanceModulusSlopeMag(0)).toBeUndefined();
    expect(model.kpcPerArcsec(0)).toBeUndefined();
    expect(model.comovingKpcPerArcsec(0)).toBeUndefined();
    expect(model.arcsecPerKpc(0)).toBeUndefined();
  });

  it('at tiny redshifts, keeps full accuracy against the series in z', () => {
    for (const id of ['conv70', 'planck18', 'wmap9'] as const) {
      const cosmology = createCosmology(id);
      // q0 and j0 from the densities: radiation and relativistic neutrinos count once in q0 (the 0.06 eV one is matter by now
      // to within 1e-3 of its density, which at these z is far below the tolerance).
      const heavy = id === 'planck18' ? cosmology.omegaNeutrinos : 0;
      const light = cosmology.omegaPhotons + cosmology.omegaNeutrinos - heavy;
      const q0 = (cosmology.omegaMatter + heavy) / 2 + light - cosmology.omegaDarkEnergy;
      for (const z of [1e-12, 1e-9, 1e-7, 1e-6]) {
        const series = cosmology.hubbleDistanceMpc * z * (1 + ((1 - q0) * z) / 2);
        // What the series leaves out is of order z² (and the neutrino simplification 1e-5 z).
        expect(relative(cosmology.luminosityDistanceMpc(z), series)).toBeLessThan(3e-15 + z * z + 1e-5 * z);
        const lookback = cosmology.hubbleTimeGyr * z * (1 - ((2 + q0) * z) / 2);
        expect(relative(cosmology.lookbackTimeGyr(z), lookback)).toBeLessThan(3e-15 + 2 * z * z + 1e-5 * z);
      }
    }
  });

  it('refuses redshifts below zero, above the limit and not numbers, and says what is allowed', () => {
    const functions: ((z: number) => unknown)[] = [
      (z) => model.expansionRateRatio(z),
      (z) => model.comovingDistanceMpc(z),
      (z) => model.luminosityDistanceMpc(z),
      (z) => model.ageGyr(z),
      (z) => model.lookbackTimeGyr(z),
      (z) => model.comovingVolumeMpc3(z),
      (z) => model.omegaNeutrinosAt(z),
      (z) => model.scaleFactor(z),
      (z) => model.cmbTemperatureK(z),
      (z) => model.angularDiameterDistanceBetweenMpc(z, 5000),
      (z) => model.comovingVolumeBetweenMpc3(0, z),
    ];
    for (const call of functions) {
      for (const bad of [-1.5, -1, -0.001, -1e-300, NaN, Infinity, 1e9, MAX_REDSHIFT * 1.0001]) {
        expect(() => call(bad)).toThrow(OutOfDomainError);
      }
    }
    expect(model.luminosityDistanceMpc(MAX_REDSHIFT)).toBeGreaterThan(1e8);
    try {
      model.luminosityDistanceMpc(-0.5);
      expect.unreachable();
    } catch (error) {
      expect(error).toMatchObject({
        argument: 'redshift',
        value: -0.5,
        allowed: { minimum: 0, maximum: MAX_REDSHIFT },
      });
    }
    // Untyped callers exist: text is not a redshift, even if it could be read as one.
    expect(() => model.luminosityDistanceMpc('1' as unknown as number)).toThrow(OutOfDomainError);
  });

  it('has no redshift for an age beyond today, a negative time or a distance beyond the limit', () => {
    const today = model.ageGyr(0);
    expect(model.redshiftAtAgeGyr(today)).toBeLessThan(1e-14);
    expect(() => model.redshiftAtAgeGyr(today * (1 + 1e-12))).toThrow(NoSolutionError);
    expect(() => model.redshiftAtAgeGyr(14)).toThrow(NoSolutionError);
    expect(() => model.redshiftAtAgeGyr(0)).toThrow(NoSolutionError);
    expect(() => model.redshiftAtAgeGyr(NaN)).toThrow(NoSolutionError);
    expect(() => model.redshiftAtLookbackTimeGyr(-1)).toThrow(NoSolutionError);
    expect(model.redshiftAtLookbackTimeGyr(0)).toBe(0);
    expect(() => model.redshiftAtLookbackTimeGyr(13.8)).toThrow(NoSolutionError);
    expect(() => model.redshiftAtComovingDistanceMpc(15000)).toThrow(NoSolutionError);
    expect(() => model.redshiftAtLuminosityDistanceMpc(-1)).toThrow(NoSolutionError);
    expect(() => model.redshiftAtLuminosityDistanceMpc(1e12)).toThrow(NoSolutionError);
    expect(() => model.redshiftAtDistanceModulusMag(NaN)).toThrow(NoSolutionError);
    expect(() => model.redshiftsAtAngularDiameterDistanceMpc(2000)).toThrow(NoSolutionError);
    expect(() => model.redshiftsAtKpcPerArcsec(9)).toThrow(NoSolutionError);
    expect(model.redshiftsAtKpcPerArcsec(8)).toHaveLength(2);
    const peak = model.angularDiameterDistanceMaximum()!;
    expect(model.redshiftsAtAngularDiameterDistanceMpc(peak.distanceMpc).length).toBeGreaterThan(0);
  });

  it('an angular-diameter distance so small that its far side lies beyond the limit has one redshift', () => {
    const least = model.angularDiameterDistanceMpc(MAX_REDSHIFT);
    expect(model.redshiftsAtAngularDiameterDistanceMpc(least * 0.99)).toHaveLength(1);
    expect(model.redshiftsAtAngularDiameterDistanceMpc(least * 1.01)).toHaveLength(2);
  });
});

describe('parameters', () => {
  const base: CosmologyParameters = { hubbleConstantKmSMpc: 70, omegaMatter: 0.3 };

  it('are refused outside their ranges, by name', () => {
    const bad: [Partial<CosmologyParameters>, string][] = [
      [{ hubbleConstantKmSMpc: 0 }, 'hubbleConstantKmSMpc'],
      [{ hubbleConstantKmSMpc: NaN }, 'hubbleConstantKmSMpc'],
      [{ omegaMatter: -0.1 }, 'omegaMatter'],
      [{ omegaDarkEnergy: 11 }, 'omegaDarkEnergy'],
      [{ w0: 3 }, 'w0'],
      [{ wa: Infinity }, 'wa'],
      [{ cmbTemperatureK: -1 }, 'cmbTemperatureK'],
      [{ effectiveNeutrinoCount: -1 }, 'effectiveNeutrinoCount'],
      [{ neutrinoMassesEv: [0, -0.1] }, 'neutrinoMassesEv'],
    ];
    for (const [change, argument] of bad) {
      expect(() => createCosmology({ ...base, ...change })).toThrow(expect.objectContaining({ argument }));
    }
    expect(() => createCosmology({ ...base, neutrinoMassesEv: Array(21).fill(0) })).toThrow(InvalidCosmologyError);
    expect(() => createCosmology('planck99' as 'planck18')).toThrow(/planck18/);
    expect(() => createCosmology('constructor' as 'planck18')).toThrow(InvalidCosmologyError);
  });

  it('that bounce instead of beginning are refused', () => {
    expect(() => createCosmology({ ...base, omegaMatter: 0.1, omegaDarkEnergy: 2 })).toThrow(NoBigBangError);
    expect(() => createCosmology({ ...base, omegaMatter: 0, omegaDarkEnergy: 1.001 })).toThrow(NoBigBangError);
    // Just on either side of the edge for Ωm = 0.3: Ω_DE = 4 Ωm cosh³(arcosh((1−Ωm)/Ωm)/3), Carroll, Press & Turner 1992,
    // ARA&A 30, 499, eq. 12.
    const edge = 4 * 0.3 * Math.cosh(Math.acosh(0.7 / 0.3) / 3) ** 3;
    expect(() => createCosmology({ ...base, omegaDarkEnergy: edge + 1e-6 })).toThrow(NoBigBangError);
    const loitering = createCosmology({ ...base, omegaDarkEnergy: edge - 1e-6 });
    expect(loitering.ageGyr(0)).toBeGreaterThan(25);
    expect(loitering.comovingDistanceMpc(5)).toBeGreaterThan(0);
  });

  it('that all but stand still are refused or computed, whichever it is', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.05, max: 0.45, noNaN: true }),
        fc.double({ min: -12, max: -2, noNaN: true }),
        (omegaMatter, exponent) => {
          const edge = 4 * omegaMatter * Math.cosh(Math.acosh((1 - omegaMatter) / omegaMatter) / 3) ** 3;
          let model: Cosmology;
          try {
            model = createCosmology({ ...base, omegaMatter, omegaDarkEnergy: edge - 10 ** exponent });
          } catch (error) {
            expect(error).toBeInstanceOf(InvalidCosmologyError);
            expect(exponent).toBeLessThan(-5);
            return;
          }
          expect(model.ageGyr(0)).toBeGreaterThan(model.ageGyr(20));
          expect(model.comovingDistanceMpc(1000)).toBeGreaterThan(model.comovingDistanceMpc(20));
          expect(relative(model.redshiftAtComovingDistanceMpc(model.comovingDistanceMpc(1)), 1)).toBeLessThan(1e-6);
        },
      ),
      { numRuns: 50 },
    );
  });

  it('anywhere in their ranges lead to finite numbers or to a refusal with a name, never to anything else', () => {
    const within = (name: Exclude<keyof typeof PARAMETER_RANGES, 'neutrinoMassesEv'>) =>
      fc.double({ min: PARAMETER_RANGES[name].minimum, max: PARAMETER_RANGES[name].maximum, noNaN: true });
    const anything = fc.record({
      hubbleConstantKmSMpc: within('hubbleConstantKmSMpc'),
      omegaMatter: within('omegaMatter'),
      omegaDarkEnergy: fc.option(within('omegaDarkEnergy'), { nil: undefined }),
      w0: within('w0'),
      wa: within('wa'),
      cmbTemperatureK: within('cmbTemperatureK'),
      effectiveNeutrinoCount: within('effectiveNeutrinoCount'),
      neutrinoMassesEv: fc.array(fc.double({ min: 0, max: 100, noNaN: true }), { maxLength: 4 }),
    });
    const z = fc.double({ min: 0, max: MAX_REDSHIFT, noNaN: true, minExcluded: true });
    const refused = [OutOfDomainError, AntipodeError, NoSolutionError];
    fc.assert(
      fc.property(anything, z, (parameters, redshift) => {
        let model: Cosmology;
        try {
          model = createCosmology(parameters);
        } catch (error) {
          expect(error).toBeInstanceOf(InvalidCosmologyError);
          return;
        }
        const calls: (() => number | readonly number[] | undefined)[] = [
          () => model.comovingDistanceMpc(redshift),
          () => model.luminosityDistanceMpc(redshift),
          () => model.comovingVolumeMpc3(redshift),
          () => model.lookbackTimeGyr(redshift),
          () => (model.ageGyr(redshift) === Infinity ? 0 : model.ageGyr(redshift)),
          () => model.angularDiameterDistanceMaximum()?.distanceMpc,
          () => model.redshiftAtLuminosityDistanceMpc(1000),
          () => model.redshiftAtAgeGyr(1),
          () => model.redshiftsAtKpcPerArcsec(1),
          () => distanceRows(model, [redshift])[0]!.luminosityDistanceMpc,
        ];
        for (const call of calls) {
          try {
            for (const value of [call() ?? 0].flat()) expect(Number.isFinite(value)).toBe(true);
          } catch (error) {
            if (!refused.some((kind) => error instanceof kind)) throw error;
          }
        }
      }),
      { numRuns: 150 },
    );
  });

  it('with next to nothing in them are as good as empty of it', () => {
    const fading = { hubbleConstantKmSMpc: 70, w0: 0, wa: -20 };
    for (const omegaMatter of [6.4e-323, 1e-315, 1.2e-283, 1e-31]) {
      // Nothing would be left to expand: dark energy fades away, and no matter takes over.
      expect(() => createCosmology({ ...fading, omegaMatter })).toThrow(NoBigBangError);
      const milne = createCosmology({ ...base, omegaMatter, omegaDarkEnergy: 0 });
      expect(milne.omegaMatter).toBe(0);
      expect(relative(milne.ageGyr(0), milne.hubbleTimeGyr)).toBeLessThan(1e-14);
    }
    const least = createCosmology({ ...fading, omegaMatter: 1e-29 });
    for (const value of [
      least.comovingVolumeMpc3(MAX_REDSHIFT),
      least.ageGyr(0),
      least.lookbackTimeGyr(MAX_REDSHIFT),
    ]) {
      expect(value).toBeGreaterThan(0);
      expect(value).toBeLessThan(Infinity);
    }
    expect(distanceRows(least, [0, 5, 50, MAX_REDSHIFT])).toHaveLength(4);
    const cold = createCosmology({ ...base, omegaMatter: 0.3, cmbTemperatureK: 1e-80, effectiveNeutrinoCount: 3 });
    expect(cold.omegaPhotons).toBe(0);
    expect(cold.omegaNeutrinos).toBe(0);
  });

  it('without anything to begin the expansion give an infinite age and a finite lookback time', () => {
    const deSitter = createCosmology({ ...base, omegaMatter: 0, omegaDarkEnergy: 1 });
    expect(deSitter.ageGyr(0)).toBe(Infinity);
    expect(relative(deSitter.lookbackTimeGyr(1), deSitter.hubbleTimeGyr * Math.LN2)).toBeLessThan(1e-14);
    expect(() => deSitter.redshiftAtAgeGyr(5)).toThrow(NoSolutionError);
  });

  it.each([-1.2, -3.29, -5])('with fading dark energy alone, w = %d, never began', (w0) => {
    const phantom = createCosmology({ ...base, omegaMatter: 0, w0 });
    expect(phantom.ageGyr(0)).toBe(Infinity);
    expect(phantom.redshiftAtLookbackTimeGyr(phantom.lookbackTimeGyr(2))).toBeCloseTo(2, 9);
    expect(distanceRows(phantom, [2])[0]?.ageGyr).toBeUndefined();
  });

  it('with dark energy alone of w = −0.9 have the age 2/(3(1+w)) Hubble times', () => {
    const model = createCosmology({ ...base, omegaMatter: 0, w0: -0.9 });
    expect(relative(model.ageGyr(0), model.hubbleTimeGyr * (2 / 0.3))).toBeLessThan(1e-12);
  });

  it('pad the list of neutrino masses with massless species', () => {
    const hot = { ...base, cmbTemperatureK: 2.7255, effectiveNeutrinoCount: 3.046 };
    const short = createCosmology({ ...hot, neutrinoMassesEv: [0.06] });
    const full = createCosmology({ ...hot, neutrinoMassesEv: [0, 0, 0.06] });
    expect(short.omegaNeutrinos).toBe(full.omegaNeutrinos);
  });

  it('count every neutrino of the same mass', () => {
    const hot = { ...base, cmbTemperatureK: 2.7255, effectiveNeutrinoCount: 3 };
    const of = (masses: number[]): number => createCosmology({ ...hot, neutrinoMassesEv: masses }).omegaNeutrinos;
    // A third of the effective number each, so that the densities of single species add up.
    expect(relative(of([0.4, 0.4, 0.4]), 3 * of([0.4, 0, 0]) - 2 * of([0, 0, 0]))).toBeLessThan(1e-14);
    expect(relative(of([0.4, 0.4, 0.1]), 2 * of([0.4, 0, 0]) + of([0.1, 0, 0]) - 2 * of([0, 0, 0]))).toBeLessThan(
      1e-14,
    );
  });

  it('cannot be changed afterwards', () => {
    const masses = [0.1];
    const model = createCosmology({
      ...base,
      cmbTemperatureK: 2.7,
      effectiveNeutrinoCount: 3,
      neutrinoMassesEv: masses,
    });
    masses[0] = 50;
    expect(model.parameters.neutrinoMassesEv).toEqual([0.1]);
    expect(Object.isFrozen(model)).toBe(true);
    expect(Object.isFrozen(model.parameters)).toBe(true);
  });
});
