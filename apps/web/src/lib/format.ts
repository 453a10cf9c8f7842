/** Drawn where a value is not known. Never 0, never blank. */
export const unknownMark = '—';

export interface NumberFormat {
  /** Decimals to show; wins over `significant`. */
  decimals?: number;
  /** Significant digits; the default is 4. */
  significant?: number;
  /** Writes a plus before positive values. */
  signed?: boolean;
}

const superscripts: Record<string, string> = {
  '-': '⁻',
  0: '⁰',
  1: '¹',
  2: '²',
  3: '³',
  4: '⁴',
  5: '⁵',
  6: '⁶',
  7: '⁷',
  8: '⁸',
  9: '⁹',
};

/**
 * A number for people: true minus, thin spaces between thousands, powers of ten beyond 10⁶ and below 10⁻⁴, an em dash
 * when it is null, undefined or not finite.
 */
export function formatNumber(value: number | null | undefined, format: NumberFormat = {}): string {
  if (value == null || !Number.isFinite(value)) return unknownMark;
  const magnitude = Math.abs(value);
  const significant = format.significant ?? 4;
  let text: string;
  if (format.decimals !== undefined && magnitude < 1e15) {
    text = group(magnitude.toFixed(format.decimals));
  } else if (magnitude !== 0 && (magnitude >= 1e6 || magnitude < 1e-4)) {
    const [mantissa, exponent] = magnitude.toExponential(significant - 1).split('e') as [string, string];
    text = `${mantissa} × 10${[...String(Number(exponent))].map((sign) => superscripts[sign]).join('')}`;
  } else {
    text = group(plain(magnitude, significant));
  }
  const isZero = !/[1-9]/.test(text);
  if (value < 0 && !isZero) return `−${text}`;
  return format.signed && !isZero ? `+${text}` : text;
}

/** `toPrecision` without the exponent it uses from 10^significant on. */
function plain(magnitude: number, significant: number): string {
  if (magnitude === 0) return '0';
  const integerDigits = Math.floor(Math.log10(magnitude)) + 1;
  return magnitude.toFixed(Math.min(20, Math.max(0, significant - integerDigits)));
}

function group(digits: string): string {
  const [whole, fraction] = digits.split('.') as [string, string | undefined];
  const grouped = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+(?!\d))/g, '\u202f') : whole;
  return fraction === undefined ? grouped : `${grouped}.${fraction}`;
}

/** `1 target`, `5 targets`. */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${formatNumber(count, { decimals: 0 })} ${count === 1 ? one : many}`;
}

/** Seconds as people say them: `45 s`, `12 min`, `3 h 20 min`. */
export function formatDuration(seconds: number | null | undefined): string {
  if (seconds == null || !Number.isFinite(seconds)) return unknownMark;
  if (seconds < 120) return `${formatNumber(seconds, { decimals: seconds < 10 ? 1 : 0 })} s`;
  const minutes = Math.round(seconds / 60);
  if (minutes < 60) return `${minutes} min`;
  const hours = Math.floor(minutes / 60);
  const whole = (value: number) => formatNumber(value, { decimals: 0 });
  return minutes % 60 === 0 ? `${whole(hours)} h` : `${whole(hours)} h ${minutes % 60} min`;
}
