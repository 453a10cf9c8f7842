/** Text as a number: null when empty, the text itself when it is no number (for the schema to refuse, in words). */
export function parseNumber(text: string): number | string | null {
  const trimmed = text
    .trim()
    .replaceAll('−', '-')
    .replaceAll(/[\u202f\u00a0 ]/g, '');
  if (trimmed === '') return null;
  return /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/.test(trimmed) ? Number(trimmed) : text;
}
