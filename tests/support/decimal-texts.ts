const view = new DataView(new ArrayBuffer(8));

function doubleOf(bits: bigint): number {
  view.setBigUint64(0, bits);
  return view.getFloat64(0);
}

/** Whole numbers from 0 up to a bound, the same for the same seed (xorshift of 32 bits). */
function drawFrom(seed: number): (below: number) => number {
  let state = (seed >>> 0) | 1;
  return (below) => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) % below;
  };
}

/** The exact decimal digits of mantissa · 2^power, no exponent. */
function exactText(mantissa: bigint, power: number): string {
  if (power >= 0) return String(mantissa << BigInt(power));
  const digits = String(mantissa * 5n ** BigInt(-power)).padStart(1 - power, '0');
  return `${digits.slice(0, power)}.${digits.slice(power)}`;
}

/** Half way between a double and the next one, exactly: the hardest number to round. Down to the subnormals. */
function tie(draw: (below: number) => number, smallExponents: boolean): string {
  const power = smallExponents ? draw(60) - 80 : draw(2040) - 1075;
  const full = (BigInt(draw(2 ** 21)) << 32n) | BigInt(draw(2 ** 32 - 1));
  const mantissa = power <= -1075 ? full >> BigInt(draw(50)) : full | (1n << 52n);
  return exactText(2n * mantissa + 1n, Math.max(power, -1075));
}

/** Ties of so few digits that all of them are kept: odd mantissas of 54 bits over 2, 4 or 8, and powers of two times 10^23. */
function shortTie(draw: (below: number) => number): string {
  if (draw(4) === 0) return `${2n ** BigInt(draw(59))}e23`;
  return exactText((1n << 53n) | (BigInt(draw(2 ** 20)) << 32n) | BigInt(draw(2 ** 31)) | 1n, -1 - draw(3));
}

/** The text with its last digit one up or down, or cut after so many digits: beside a tie by as little as the digits allow. */
function beside(text: string, draw: (below: number) => number): string {
  if (draw(2) === 0) return text.slice(0, 16 + draw(10)).replace(/\.$/, '');
  const last = text.at(-1) ?? '0';
  const other = last === '9' ? '8' : String(Number(last) + 1);
  return `${text.slice(0, -1)}${draw(2) === 0 ? other : `${last}1`}`;
}

function anyDigits(draw: (below: number) => number): string {
  const digits = (most: number): string => Array.from({ length: draw(most) }, () => (draw(4) === 0 ? '0' : String(draw(10)))).join('');
  const whole = digits(25);
  const fraction = digits(25);
  const exponent = draw(3) === 0 ? `${draw(2) === 0 ? 'e' : 'E'}${['', '+', '-'][draw(3)]}${draw(draw(2) === 0 ? 30 : 420)}` : '';
  return `${whole}${whole === '' && fraction === '' ? '0' : ''}${draw(5) === 0 && whole === '' ? '' : '.'}${fraction}${exponent}`;
}

/**
 * Decimal numbers as texts, of which some are written by programs and some are as hard to round as can be: the shortest digits of any double, fixed and
 * given numbers of digits, any digits with any exponent, ties between neighbours and what lies beside them.
 */
export function decimalTexts(seed: number, count: number): string[] {
  const draw = drawFrom(seed);
  const texts: string[] = [];
  while (texts.length < count) {
    const bits = (BigInt(draw(2 ** 31)) << 32n) | BigInt(draw(2 ** 32 - 1));
    const anyDouble = doubleOf(bits);
    const coordinate = (draw(2 ** 31) / 2 ** 31 - 0.5 + draw(2 ** 20) / 2 ** 51) * 10 ** (draw(12) - 6);
    const small = doubleOf((bits & 0xfffffffffffffn) >> BigInt(draw(52)));
    const hard = tie(draw, draw(2) === 0);
    const made = [String(coordinate), coordinate.toFixed(draw(25)), coordinate.toPrecision(1 + draw(30)), coordinate.toExponential(draw(25)), String(small), anyDigits(draw), shortTie(draw), hard, beside(hard, draw)];
    if (Number.isFinite(anyDouble)) made.push(String(anyDouble), anyDouble.toPrecision(1 + draw(30)));
    for (const text of made) texts.push(draw(4) === 0 && !text.startsWith('-') ? `${draw(2) === 0 ? '-' : '+'}${text}` : text);
  }
  return texts;
}
