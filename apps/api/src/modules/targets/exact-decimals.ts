/** A decimal number as a whole number of its last places: `7.05` is 705 of two decimals. */
interface Scaled {
  units: bigint;
  decimals: number;
}

/** A finite number, or its decimal text. */
type Decimal = number | string;

function scaledOf(value: Decimal): Scaled {
  const [mantissa = '0', exponent = '0'] = String(value).toLowerCase().split('e');
  const [whole = '0', fraction = ''] = mantissa.split('.');
  const units = BigInt(whole + fraction);
  const decimals = fraction.length - Number(exponent);
  return decimals >= 0 ? { units, decimals } : { units: units * 10n ** BigInt(-decimals), decimals: 0 };
}

function combined(a: Decimal, b: Decimal, sign: 1n | -1n): string {
  const one = scaledOf(a);
  const other = scaledOf(b);
  const decimals = Math.max(one.decimals, other.decimals);
  const at = ({ units, decimals: own }: Scaled) => units * 10n ** BigInt(decimals - own);
  const sum = at(one) + sign * at(other);
  const digits = String(sum < 0n ? -sum : sum).padStart(decimals + 1, '0');
  const whole = digits.slice(0, digits.length - decimals);
  const fraction = digits.slice(digits.length - decimals).replace(/0+$/, '');
  return `${sum < 0n ? '-' : ''}${whole}${fraction === '' ? '' : `.${fraction}`}`;
}

/**
 * The sum of two decimal numbers as a text with every digit, as a person would add them: 7 + 0.05 is 7.05, where doubles would
 * leave a rounding error for everybody to see.
 */
export function addDecimals(a: Decimal, b: Decimal): string {
  return combined(a, b, 1n);
}

/** The difference likewise. */
export function subtractDecimals(a: Decimal, b: Decimal): string {
  return combined(a, b, -1n);
}
