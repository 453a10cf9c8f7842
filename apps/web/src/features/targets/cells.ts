import type { Target, TargetCells } from '@faintward/contracts/targets';

export type CellName = keyof TargetCells;

/** Columns that are typed into, as fields of the grid (and of the server's sort), with the cell each stands for. */
export const cellOfField = {
  name: 'name',
  rightAscensionDeg: 'rightAscension',
  declinationDeg: 'declination',
  redshift: 'redshift',
  redshiftUncertainty: 'redshiftUncertainty',
  brightnessText: 'brightness',
  notes: 'notes',
} as const satisfies Record<string, CellName>;
export type EditableField = keyof typeof cellOfField;

export function isEditableField(field: string): field is EditableField {
  return field in cellOfField;
}

/** What a cell is called in a sentence. */
export const cellWords: Record<CellName, string> = {
  name: 'name',
  rightAscension: 'right ascension',
  declination: 'declination',
  redshift: 'redshift',
  redshiftUncertainty: 'uncertainty of the redshift',
  brightness: 'brightness',
  notes: 'notes',
};

/** The stored content of a cell as it is typed. Numbers keep every digit. */
export function storedText(target: Target, cell: CellName): string {
  switch (cell) {
    case 'name':
      return target.name;
    case 'rightAscension':
      return target.rightAscensionText;
    case 'declination':
      return target.declinationText;
    case 'redshift':
      return String(target.redshift);
    case 'redshiftUncertainty':
      return target.redshiftUncertaintyText;
    case 'brightness':
      return target.brightnessText;
    case 'notes':
      return target.notes;
  }
}

/** Decimals that show a redshift as it is known: at least three, never cut before the sixth. */
export function redshiftDecimals(redshift: number): number {
  const decimals = /\.(\d+)$/.exec(String(redshift))?.[1]?.length ?? 0;
  return Math.min(6, Math.max(3, decimals));
}

/** Notices in two words, for the grid; the whole sentence is in the tooltip and on the sheet. */
const shortNotices: Record<string, string> = {
  noBrightness: 'no light',
  lightUnusable: 'light unusable',
  beyondLymanBreak: 'no flux in band',
  neverUp: 'never up',
  brieflyUp: 'briefly up',
  smallerThanSeeing: 'unresolved',
  duplicate: 'twice in list',
  lineAbsorbed: 'line absorbed',
  lineOutsideAtmosphere: 'line never arrives',
  lineInGap: 'line in a gap',
};

export function shortNotice(notice: { code: string; message: string }): string {
  return shortNotices[notice.code] ?? notice.message;
}
