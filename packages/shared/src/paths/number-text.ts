/** How a number is to be set. Without `digits` and `decimals` four significant digits are shown, blank zeros left off. */
export interface NumberStyle {
  readonly digits?: number;
  readonly decimals?: number;
  readonly scientific?: boolean;
}

const usualDigits = 4;
const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹';
/** Powers of ten within which numbers are written out. */
const plainFrom = -5;
const plainTo = 7;

const withMinus = (text: string) => text.replace('-', '−');

function exponentText(exponent: number): string {
  const digits = [...String(Math.abs(exponent))].map((digit) => superscripts[Number(digit)]).join('');
  return `10${exponent < 0 ? '⁻' : ''}${digits}`;
}

/** "9.83", "−0.0021", "1.6 × 10⁻⁹". Rounding is that of the decimal value, halves away from zero. */
export function numberText(value: number, style: NumberStyle = {}): string {
  if (!Number.isFinite(value)) return 'not a number';
  if (style.decimals !== undefined && style.scientific !== true && Math.abs(value) < 1e21) {
    return withMinus(value.toFixed(style.decimals));
  }
  const open = style.digits === undefined && style.decimals === undefined;
  if (open && style.scientific !== true && Number.isSafeInteger(value)) return withMinus(String(value));
  const digits = style.digits ?? (style.decimals === undefined ? usualDigits : style.decimals + 1);
  const [mantissa = '0', power = '0'] = value.toExponential(digits - 1).split('e');
  const exponent = Number(power);
  const bare = (text: string) => (open && text.includes('.') ? text.replace(/\.?0+$/u, '') : text);
  const plain = exponent >= plainFrom && exponent < plainTo && style.scientific !== true;
  if (!plain && value !== 0) return withMinus(`${bare(mantissa)} × ${exponentText(exponent)}`);
  const places = digits - 1 - exponent;
  return withMinus(
    bare(places >= 0 ? value.toFixed(Math.min(100, places)) : Number(`${mantissa}e${power}`).toFixed(0)),
  );
}

/** A unit as it is set beside a number: "uM" reads µM. */
export const unitText = (unit: string): string => unit.replace(/(?<![\p{L}])u(?=\p{L})/gu, 'µ');
