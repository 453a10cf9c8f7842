/**
 * Rows as RFC 4180 text. Cells that a spreadsheet would take for a formula get an apostrophe before them; numbers are
 * written with every digit they have, and unknown values are left empty.
 */
export function toCsv(
  header: readonly string[],
  rows: readonly (readonly (string | number | null | undefined)[])[],
): string {
  const cell = (value: string | number | null | undefined): string => {
    if (value == null || (typeof value === 'number' && !Number.isFinite(value))) return '';
    if (typeof value === 'number') return String(value);
    const safe = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
    return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
  };
  return [header, ...rows].map((row) => row.map(cell).join(',')).join('\r\n') + '\r\n';
}

/** Hands text to the person as a file. */
export function downloadText(fileName: string, text: string, type = 'text/csv;charset=utf-8'): void {
  const url = URL.createObjectURL(new Blob([text], { type }));
  const link = document.createElement('a');
  link.href = url;
  link.download = fileName;
  link.click();
  // Revoked later: some browsers start reading the blob only after this turn.
  setTimeout(() => URL.revokeObjectURL(url), 10_000);
}
