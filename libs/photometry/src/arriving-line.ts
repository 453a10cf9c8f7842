import { CM_PER_MPC } from './constants.js';
import type { LightCaution } from './arriving-continuum.js';
import { DARK_TRANSMISSION, distanceModulusMag, inMicrons, NO_DISTANCE } from './no-light.js';
import { attenuationMag, defaultTotalToSelective, DUST_LAWS } from './dust.js';
import { LYMAN_ALPHA_NM } from './lines.js';
import { type Ledger, ledgerInput, type LedgerInput } from './ledger.js';
import { LIGHT_STEPS, type LightStepId } from './light-steps.js';
import { lensingMag } from './lensing.js';
import { LINE_MARGIN } from './seen-spectrum.js';
import { curveValueAt } from './sampled-curve.js';
import type { LineLight, LuminosityDistances, NoLight } from './source-light.js';
import { abMagnitudeAt, abMagnitudeOfPhotons, linePhotonIntegral, type Response } from './synthetic.js';
import { galacticDustOf } from './way.js';

/** Area of the sphere of 10 pc: luminosities become fluxes at the distance of absolute magnitudes. */
const TEN_PARSEC_SPHERE_CM2 = 4 * Math.PI * (1e-5 * CM_PER_MPC) ** 2;

/** A line as it arrives above the atmosphere: every step takes the same part of all its light. */
export class ArrivingLine {
  readonly kind = 'line';
  readonly observedWavelengthNm: number;

  /**
   * @param distances  asked only where the light is given as a luminosity
   * @param isSurface  the light is per arcsec², which lensing leaves as it is
   */
  constructor(
    readonly light: LineLight,
    readonly redshift: number,
    private readonly distances: LuminosityDistances,
    private readonly isSurface = false,
  ) {
    this.observedWavelengthNm = light.restWavelengthNm * (1 + redshift);
  }

  /** AB magnitude of a flat spectrum with as many photons in the range as the line has, or why there is none. */
  magnitudeIn(response: Response): number | NoLight {
    return this.whyDark(response) ?? this.sumMag(this.start(response));
  }

  /** Flux above the atmosphere in erg s⁻¹ cm⁻²; undefined where nothing arrives. */
  fluxErgSCm2(): number | undefined {
    if (this.whyNone() !== undefined) return undefined;
    const { amount } = this.light.quoted;
    const atTenParsec = this.light.frame === 'rest' ? amount / TEN_PARSEC_SPHERE_CM2 : amount;
    return atTenParsec * 10 ** (-0.4 * this.sumMag(0));
  }

  /** Adds the steps to a ledger, up to the top of the atmosphere; answers why there is no light, if so. */
  addSteps(ledger: Ledger, response: Response): NoLight | undefined {
    const without = this.whyOutside(response) ?? this.whyNoDistance();
    if (without !== undefined) return without;
    const { quoted } = this.light;
    ledger.add(
      QUOTED_STEPS[quoted.kind],
      quoted.source === undefined
        ? LIGHT_STEPS[QUOTED_STEPS[quoted.kind]]
        : { ...LIGHT_STEPS[QUOTED_STEPS[quoted.kind]], source: quoted.source },
      this.start(response),
      [
        ...quoted.inputs,
        ledgerInput('wavelengthNm', this.observedWavelengthNm, 'nm'),
        ledgerInput('logIntegral', response.logIntegral),
      ],
    );
    for (const { id, mag, inputs, source } of this.steps()) {
      ledger.add(id, source === undefined ? LIGHT_STEPS[id] : { ...LIGHT_STEPS[id], source }, mag, inputs);
    }
    return this.whyAbsorbed();
  }

  /**
   * The same way from its beginning, where a flux was given: from the luminosity that it implies, before host dust and lensing,
   * through all that lies between, to the same total. Otherwise as {@link addSteps}.
   */
  addStepsFromSource(ledger: Ledger, response: Response): NoLight | undefined {
    const flux = this.fluxErgSCm2();
    if (this.light.frame === 'rest' || this.redshift === 0 || this.isSurface || flux === undefined) {
      return this.addSteps(ledger, response);
    }
    const emitting = (amount: number): ArrivingLine =>
      new ArrivingLine(
        {
          ...this.light,
          frame: 'rest',
          includes: { hostDust: false, galacticDust: false, lensing: false },
          quoted: {
            kind: 'implied',
            amount,
            inputs: [...this.light.quoted.inputs, ledgerInput('lineLuminosityErgS', amount, 'erg/s')],
          },
        },
        this.redshift,
        this.distances,
      );
    const ofUnit = emitting(TEN_PARSEC_SPHERE_CM2).fluxErgSCm2();
    if (ofUnit === undefined) return this.addSteps(ledger, response);
    return emitting((TEN_PARSEC_SPHERE_CM2 * flux) / ofUnit).addSteps(ledger, response);
  }

  /** AB magnitude at the line of what is seen under it, as it arrives; undefined without a continuum. */
  continuumMagnitudeAb(): number | undefined {
    const { continuum } = this.light;
    if (continuum.kind === 'none') return undefined;
    if (continuum.kind === 'magnitude') return continuum.magnitudeAb;
    const flux = this.fluxErgSCm2();
    if (flux === undefined) return undefined;
    const observedWidthNm = continuum.restEquivalentWidthNm * (1 + this.redshift);
    return abMagnitudeAt(flux / observedWidthNm, this.observedWavelengthNm);
  }

  cautions(): LightCaution[] {
    const { restWavelengthNm, frame } = this.light;
    if (this.redshift === 0 || restWavelengthNm > LYMAN_ALPHA_NM * (1 + LINE_MARGIN)) return [];
    return [
      {
        code: 'lymanAlphaLine',
        message:
          frame === 'observed'
            ? 'The flux of Lyα and bluer lines must be what is left behind the intergalactic medium: nothing is taken off.'
            : 'At Lyα the intergalactic medium takes a part that differs from source to source; nothing is taken off Lyα itself here.',
      },
    ];
  }

  private start(response: Response): number {
    const { quoted, frame } = this.light;
    const flux = frame === 'rest' ? quoted.amount / TEN_PARSEC_SPHERE_CM2 : quoted.amount;
    return abMagnitudeOfPhotons(linePhotonIntegral(response, this.observedWavelengthNm, flux), response);
  }

  private sumMag(start: number): number {
    return this.steps().reduce((sum, { mag }) => sum + mag, start);
  }

  private steps(): { id: LightStepId; mag: number; inputs: LedgerInput[]; source?: string }[] {
    const { light, redshift } = this;
    const steps: { id: LightStepId; mag: number; inputs: LedgerInput[]; source?: string }[] = [];
    if (light.escapeFraction !== 1) {
      steps.push({
        id: 'escape-fraction',
        mag: -2.5 * Math.log10(light.escapeFraction),
        inputs: [ledgerInput('escapeFraction', light.escapeFraction)],
      });
    }
    if (light.frame === 'rest') {
      const now = distanceModulusMag(this.distances, redshift);
      if (light.derivedWith !== undefined) {
        const then = distanceModulusMag(light.derivedWith, redshift);
        steps.push({
          id: 'literature-cosmology',
          mag: then - now,
          inputs: [
            ledgerInput('literatureDistanceModulusMag', then, 'mag'),
            ledgerInput('distanceModulusMag', now, 'mag'),
          ],
        });
      }
      steps.push({
        id: 'distance-modulus',
        mag: now,
        inputs: [
          ledgerInput('redshift', redshift),
          ledgerInput('luminosityDistanceMpc', this.distances.luminosityDistanceMpc(redshift), 'Mpc'),
        ],
      });
    }
    const { hostDust, galacticDust, includes, magnification } = light;
    if (hostDust !== null && !includes.hostDust) {
      const ratio = hostDust.totalToSelective ?? defaultTotalToSelective(hostDust.law);
      steps.push({
        id: 'host-dust',
        mag: attenuationMag(hostDust.law, light.restWavelengthNm, hostDust.colourExcessMag, ratio),
        inputs: [ledgerInput('colourExcessMag', hostDust.colourExcessMag, 'mag')],
        source: DUST_LAWS[hostDust.law].source,
      });
    }
    const depth = light.frame === 'rest' ? this.intergalacticDepth() : 0;
    if (depth > 0 && light.medium !== null) {
      steps.push({
        id: 'intergalactic',
        mag: (2.5 / Math.LN10) * depth,
        inputs: [ledgerInput('redshift', redshift)],
        source: light.medium.source,
      });
    }
    if (magnification !== 1 && !includes.lensing && !this.isSurface) {
      steps.push({
        id: 'lensing',
        mag: lensingMag(magnification),
        inputs: [ledgerInput('magnification', magnification)],
      });
    }
    if (galacticDust !== null && !(includes.galacticDust && light.frame === 'observed')) {
      steps.push({
        id: 'galactic-dust',
        mag: galacticDustOf(galacticDust)(Math.log(this.observedWavelengthNm)),
        inputs: [ledgerInput('colourExcessMag', galacticDust.colourExcessMag, 'mag')],
        source: DUST_LAWS[galacticDust.law].source,
      });
    }
    return steps;
  }

  private intergalacticDepth(): number {
    const { medium, restWavelengthNm } = this.light;
    if (medium === null || this.redshift === 0 || restWavelengthNm >= LYMAN_ALPHA_NM * (1 - LINE_MARGIN)) return 0;
    return medium.opticalDepth(this.observedWavelengthNm, this.redshift);
  }

  private whyDark(response: Response): NoLight | undefined {
    return this.whyOutside(response) ?? this.whyNone();
  }

  private whyNone(): NoLight | undefined {
    return this.whyNoDistance() ?? this.whyAbsorbed();
  }

  private whyNoDistance(): NoLight | undefined {
    return this.light.frame === 'rest' && this.redshift === 0 ? NO_DISTANCE : undefined;
  }

  private whyOutside({ curve, passLowNm: lowNm, passHighNm: highNm }: Response): NoLight | undefined {
    const nm = this.observedWavelengthNm;
    const isInside = nm >= lowNm && nm <= highNm;
    if (isInside && curveValueAt(curve, nm) > 0) return undefined;
    if (isInside) {
      return {
        code: 'lineOutsideBand',
        message: `The line falls at ${nm.toFixed(1)} nm, where this range lets nothing through.`,
      };
    }
    return {
      code: 'lineOutsideBand',
      message: `The line falls at ${nm.toFixed(1)} nm, outside ${inNanometres(lowNm)} to ${inNanometres(highNm)} nm.`,
    };
  }

  private whyAbsorbed(): NoLight | undefined {
    if (Math.exp(-this.intergalacticDepth()) >= DARK_TRANSMISSION) return undefined;
    return {
      code: 'noFluxInBand',
      message: `No flux of this line: it lies short of the Lyman break, which is at ${inMicrons(LYMAN_ALPHA_NM * (1 + this.redshift))}.`,
    };
  }
}

function inNanometres(wavelengthNm: number): string {
  return String(Number(wavelengthNm.toPrecision(5)));
}

const QUOTED_STEPS = {
  lineFlux: 'line-flux',
  lineLuminosity: 'line-luminosity',
  starFormationRate: 'line-star-formation-rate',
  implied: 'implied-line-luminosity',
} as const satisfies Record<LineLight['quoted']['kind'], LightStepId>;
