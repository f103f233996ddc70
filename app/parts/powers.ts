/** Powers as people write them. */
const RAISED: Readonly<Record<string, string>> = {
  '0': '⁰',
  '1': '¹',
  '2': '²',
  '3': '³',
  '4': '⁴',
  '5': '⁵',
  '6': '⁶',
  '7': '⁷',
  '8': '⁸',
  '9': '⁹',
  '-': '⁻',
};

/** `2^12` inside a text becomes 2¹² and `1.5e9` becomes 1.5 × 10⁹; a fractional exponent is cut to its whole part. */
export function raisePowers(text: string): string {
  const written = text.replace(/(\d)e(\d+)/g, '$1 × 10^$2');
  const raise = (_: string, exponent: string): string => [...exponent].map((c) => RAISED[c] ?? c).join('');
  return written.replace(/(?<=\d)\^(-?\d+)(?:\.\d+)?/g, raise);
}
