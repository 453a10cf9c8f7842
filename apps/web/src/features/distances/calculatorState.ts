import { CosmologyParameters, CosmologyPresetId, type CosmologyChoice } from '@faintward/contracts/cosmology';
import { MAX_REDSHIFT_COUNT } from '@faintward/contracts/distances';
import { parseNumber } from '../../ui/form/parseNumber';

const parameterNames = [
  'hubbleConstantKmSMpc',
  'omegaMatter',
  'omegaDarkEnergy',
  'w0',
  'wa',
  'cmbTemperatureK',
  'effectiveNeutrinoCount',
] as const;
export type ParameterName = (typeof parameterNames)[number];

/** What the person has typed, and what the address holds. */
export interface CalculatorState {
  redshiftText: string;
  /** A preset's id, or `custom`. */
  cosmology: string;
  parameters: Record<ParameterName, string>;
  neutrinoMassesEv: string;
  compare: boolean;
  /** Which curve, and for that of an angle the length. */
  curve: string;
  sizeKpc: string;
  /** Cosmologies drawn beside the chosen one. */
  beside: readonly CosmologyPresetId[];
  /** Whether curves are drawn against the chosen cosmology instead of as they are. */
  against: boolean;
}

const addressNames: Record<ParameterName, string> = {
  hubbleConstantKmSMpc: 'h0',
  omegaMatter: 'om',
  omegaDarkEnergy: 'ode',
  w0: 'w0',
  wa: 'wa',
  cmbTemperatureK: 'tcmb',
  effectiveNeutrinoCount: 'neff',
};

/** Longer lists stay out of the address: browsers and mail programs cut long links. */
export const longestSharedText = 1800;

export function readState(address: URLSearchParams): CalculatorState {
  const parameters = Object.fromEntries(
    parameterNames.map((name) => [name, address.get(addressNames[name]) ?? '']),
  ) as Record<ParameterName, string>;
  return {
    redshiftText: address.get('z') ?? '0.5, 2, 7.12',
    cosmology: address.get('model') ?? 'planck18',
    parameters,
    neutrinoMassesEv: address.get('mnu') ?? '',
    compare: address.get('compare') !== 'no',
    curve: address.get('curve') ?? 'distances',
    sizeKpc: address.get('kpc') ?? '10',
    beside: readBeside(address),
    against: address.get('against') === 'yes',
  };
}

/** Links from before there was a choice compare with the conventional model, or with none. */
function readBeside(address: URLSearchParams): CosmologyPresetId[] {
  const text = address.get('beside');
  if (text === null) return address.get('compare') === 'no' ? [] : ['conv70'];
  return CosmologyPresetId.options.filter((id) => text.split('.').includes(id));
}

export function writeState(state: CalculatorState): URLSearchParams {
  const address = new URLSearchParams();
  if (state.redshiftText.length <= longestSharedText) address.set('z', state.redshiftText);
  address.set('model', state.cosmology);
  if (state.cosmology === 'custom') {
    for (const name of parameterNames)
      if (state.parameters[name]) address.set(addressNames[name], state.parameters[name]);
    if (state.neutrinoMassesEv) address.set('mnu', state.neutrinoMassesEv);
  }
  if (!state.compare) address.set('compare', 'no');
  if (state.curve !== 'distances') address.set('curve', state.curve);
  if (state.sizeKpc !== '10') address.set('kpc', state.sizeKpc);
  const usual = state.compare ? 'conv70' : '';
  if (state.beside.join('.') !== usual) address.set('beside', state.beside.join('.'));
  if (state.against) address.set('against', 'yes');
  return address;
}

export type Read<Value> = { value: Value; errors?: undefined } | { value?: undefined; errors: Record<string, string> };

/** Redshifts from text: between them spaces, commas, semicolons or line ends; `#` starts a remark. */
export function readRedshifts(text: string): Read<number[]> {
  const words = text
    .split('\n')
    .flatMap((line) => line.replace(/#.*/, '').split(/[\s,;]+/))
    .filter((word) => word !== '');
  if (words.length === 0) return { errors: { redshiftText: 'Give at least one redshift.' } };
  if (words.length > MAX_REDSHIFT_COUNT) {
    return { errors: { redshiftText: `At most ${MAX_REDSHIFT_COUNT} redshifts at once; these are ${words.length}.` } };
  }
  const numbers = words.map(parseNumber);
  const wrong = words.filter((_word, index) => typeof numbers[index] !== 'number');
  if (wrong.length > 0) {
    const shown = wrong.slice(0, 3).map((word) => `“${word.slice(0, 30)}”`);
    return {
      errors: {
        redshiftText: `${shown.join(', ')}${wrong.length > 3 ? ` and ${wrong.length - 3} more` : ''}: not a number. Write 7.12, with a point.`,
      },
    };
  }
  return { value: numbers as number[] };
}

export function readCosmology(state: CalculatorState): Read<CosmologyChoice> {
  const preset = CosmologyPresetId.safeParse(state.cosmology);
  if (preset.success) return { value: preset.data };
  const errors: Record<string, string> = {};
  const candidate: Record<string, unknown> = {};
  for (const name of parameterNames) {
    const value = parseNumber(state.parameters[name]);
    if (typeof value === 'string') errors[name] = 'Not a number.';
    else if (value !== null) candidate[name] = value;
  }
  const masses = state.neutrinoMassesEv
    .split(/[\s,;]+/)
    .filter((word) => word !== '')
    .map(parseNumber);
  if (masses.some((mass) => typeof mass !== 'number')) errors['neutrinoMassesEv'] = 'Not a list of numbers.';
  else if (masses.length > 0) candidate['neutrinoMassesEv'] = masses;
  const parsed = CosmologyParameters.safeParse(candidate);
  if (!parsed.success) {
    for (const issue of parsed.error.issues) {
      const name = String(issue.path[0] ?? 'cosmology');
      errors[name] ??= candidate[name] === undefined ? 'Needed.' : issue.message;
    }
  }
  return parsed.success && Object.keys(errors).length === 0 ? { value: parsed.data } : { errors };
}

/** Redshifts for a curve: even in ln(1+z), from near 0 to beyond the furthest asked for. */
export function curveRedshifts(redshifts: readonly number[]): number[] {
  const furthest = Math.min(1100, Math.max(2, ...redshifts.slice(0, 5000)) * 1.15);
  const count = 90;
  return Array.from({ length: count }, (_, index) =>
    Number(Math.expm1((Math.log1p(furthest) * (index + 1)) / count).toPrecision(6)),
  );
}
