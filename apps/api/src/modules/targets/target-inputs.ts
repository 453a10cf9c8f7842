import type { FieldError } from '@faintward/contracts/errors';
import type { NewTarget, TargetCells, TargetInput, TargetPatch } from '@faintward/contracts/targets';
import { lightFaults } from '../../engine/light-faults.js';
import { uncertaintyFaults } from '../../engine/redshift-faults.js';
import { validationFailed } from '../../platform/validation.js';
import { movedWithRedshift } from './redshift-uncertainty-text.js';
import { cellFaults, readCells } from './target-cells.js';

const REQUIRED = [
  ['name', 'name', 'A name is needed.'],
  ['rightAscensionDeg', 'rightAscension', 'A right ascension is needed, such as 10:00:28.6 or 150.1192.'],
  ['declinationDeg', 'declination', 'A declination is needed, such as -27:48:18 or -27.805.'],
  ['redshift', 'redshift', 'A redshift is needed, such as 7.12.'],
] as const satisfies readonly (readonly [keyof TargetInput, keyof TargetCells, string])[];

/** @throws {DomainError} `validation-failed` naming every field that is missing or cannot be used */
export function completeInput({ cells, ...typed }: NewTarget): TargetInput {
  const { values, faults } = withCells(typed, cells, undefined);
  for (const [field, cell, message] of REQUIRED) {
    if (values[field] !== undefined || faults.some(({ path }) => path === `cells.${cell}`)) continue;
    faults.push({ path: cells === undefined ? field : `cells.${cell}`, message });
  }
  const { name, rightAscensionDeg, declinationDeg, redshift } = values;
  if (
    faults.length > 0 ||
    name === undefined ||
    rightAscensionDeg === undefined ||
    declinationDeg === undefined ||
    redshift === undefined
  ) {
    throw validationFailed(faults);
  }
  return requireFitting(
    {
      name,
      rightAscensionDeg,
      declinationDeg,
      redshift,
      redshiftUncertainty: values.redshiftUncertainty ?? null,
      redshiftKind: values.redshiftKind ?? 'spectroscopic',
      light: values.light ?? null,
      extent: values.extent ?? { kind: 'point' },
      notes: values.notes ?? '',
    },
    cells,
  );
}

/** @throws {DomainError} `validation-failed` naming every field that cannot be used */
export function patchedInput(before: TargetInput, { cells, ...typed }: TargetPatch): TargetInput {
  const { values, faults } = withCells(typed, cells, before);
  if (faults.length > 0) throw validationFailed(faults);
  const given = Object.fromEntries(Object.entries(values).filter(([, value]) => value !== undefined));
  const after: TargetInput = { ...before, ...(given as Partial<TargetInput>) };
  if (values.redshiftUncertainty === undefined) {
    after.redshiftUncertainty = movedWithRedshift(before.redshiftUncertainty, before.redshift, after.redshift);
  }
  return requireFitting(after, cells);
}

/** A cell counts before a typed value of the same field. */
function withCells(
  typed: Partial<TargetInput>,
  cells: TargetCells | undefined,
  before: TargetInput | undefined,
): { values: Partial<TargetInput>; faults: FieldError[] } {
  if (cells === undefined) return { values: typed, faults: [] };
  const light = typed.light ?? before?.light ?? null;
  const reading = readCells(cells, {
    brightness: { present: light, bandId: 'V', system: 'AB' },
    redshift: typed.redshift ?? before?.redshift,
    present: before && { redshift: before.redshift, uncertainty: before.redshiftUncertainty },
  });
  return { values: { ...typed, ...reading.values }, faults: cellFaults(reading.errors) };
}

/** Errors of values that do not fit each other stand at the cell, where the value came from one. */
function requireFitting(values: TargetInput, cells: TargetCells | undefined): TargetInput {
  const faults = [...lightFaults(values), ...uncertaintyFaults(values)].map(({ path, message }) => {
    if (path === 'redshift' && cells?.redshift !== undefined) return { path: 'cells.redshift', message };
    if (path.startsWith('light') && cells?.brightness !== undefined) return { path: 'cells.brightness', message };
    if (path.startsWith('redshiftUncertainty') && cells?.redshiftUncertainty !== undefined) {
      return { path: 'cells.redshiftUncertainty', message };
    }
    // Percentiles that moved with the redshift.
    if (path.startsWith('redshiftUncertainty') && cells?.redshift !== undefined)
      return { path: 'cells.redshift', message };
    // The redshift was there before; what was typed now is the light.
    if (path === 'redshift' && cells?.brightness !== undefined) return { path: 'cells.brightness', message };
    return { path, message };
  });
  if (faults.length > 0) throw validationFailed(faults);
  return values;
}

/** The part of a stored row that people set. */
export function inputOf(stored: TargetInput): TargetInput {
  const { name, rightAscensionDeg, declinationDeg, redshift, redshiftUncertainty, redshiftKind, light, extent, notes } =
    stored;
  return { name, rightAscensionDeg, declinationDeg, redshift, redshiftUncertainty, redshiftKind, light, extent, notes };
}
