/** 10^k as people write it. */
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
  '.': '·',
};

/** `10^12` inside a sentence becomes 10¹²; other text stays. */
export function raisePowers(text: string): string {
  return text.replace(
    /10\^(-?\d+)/g,
    (_, exponent: string) => `10${[...exponent].map((c) => RAISED[c] ?? c).join('')}`,
  );
}
