/** Why a cell is not a decimal number. */
export type NumberRefusalCode =
  'empty' | 'decimal-comma' | 'thousands-separator' | 'not-a-number' | 'not-finite' | 'not-decimal';

export type ParsedNumber =
  | { readonly ok: true; readonly value: number }
  | { readonly ok: false; readonly code: NumberRefusalCode; readonly message: string };

const decimalNumber = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?$/i;

/**
 * The number that a person typed into a cell: decimal point, optional exponent, optional sign, outer blanks ignored. The typographic minus signs
 * (U+2212, U+2010 to U+2013, U+FE63, U+FF0D) count as a minus. Anything that could be meant in two ways is refused with the reason, never guessed.
 * Correctly rounded; a number too small for a double becomes 0.
 */
export function parseDecimal(text: string): ParsedNumber {
  const shown = text.trim();
  const plain = normaliseMinus(shown);
  if (plain === '') return refuse('empty', 'The cell is empty; a number is needed.');
  if (decimalNumber.test(plain)) {
    const value = Number(plain);
    if (!Number.isFinite(value)) return refuse('not-finite', `${quote(shown)} is too large for a number here.`);
    return { ok: true, value };
  }
  if (/^[+-]?\d+,\d+(?:e[+-]?\d+)?$/i.test(plain)) {
    return refuse(
      'decimal-comma',
      `${quote(shown)} has a comma. Write a decimal point instead: ${plain.replace(',', '.')}. Thousands are not separated.`,
    );
  }
  if (/^[+-]?\d{1,3}(?:[,' \u00a0\u202f]\d{3})+(?:\.\d*)?$/.test(plain)) {
    return refuse(
      'thousands-separator',
      `${quote(shown)} separates thousands. Write the digits without separators: ${plain.replace(/[,' \u00a0\u202f]/g, '')}.`,
    );
  }
  if (/^[+-]?(?:nan|inf|infinity)$/i.test(plain)) {
    return refuse(
      'not-finite',
      `${quote(shown)} is not a finite number. Leave the cell empty if the value is unknown.`,
    );
  }
  if (/^[+-]?0[xbo][0-9a-f]+$/i.test(plain))
    return refuse('not-decimal', `${quote(shown)} is not written in decimal digits.`);
  return refuse('not-a-number', `${quote(shown)} is not a number. Write it like 1.5 or 2e-17.`);
}

/** Every dash that a spreadsheet or a publisher may put for a minus sign, as an ASCII minus. */
export function normaliseMinus(text: string): string {
  return text.replace(/[\u2212\u2010-\u2013\ufe63\uff0d]/g, '-');
}

function quote(text: string): string {
  return `"${text.length > 40 ? `${text.slice(0, 39)}…` : text}"`;
}

function refuse(code: NumberRefusalCode, message: string): ParsedNumber {
  return { ok: false, code, message };
}
