import fc from 'fast-check';

/** A text that stands for one value, with what must be read from it. */
export interface Sample {
  readonly text: string;
  readonly kind: 'real' | 'complex' | 'series';
  readonly label: string | undefined;
  /** Canonical digits of the parts, in order. */
  readonly digits: readonly string[];
}

/** Plain positional digits with a point, the way `canonicalText` writes them. */
const plain = fc
  .tuple(
    fc.boolean(),
    fc.integer({ min: 0, max: 999 }),
    fc.stringMatching(/^[0-9]{8,60}$/),
    fc.integer({ min: 1, max: 9 }),
  )
  .map(([minus, whole, fraction, last]) => `${minus ? '-' : ''}${whole}.${fraction}${last}`);

/** The same digits as people and programs print them. */
function dressed(digits: string): fc.Arbitrary<string> {
  const [whole = '', fraction = ''] = digits.split('.');
  const grouped = (mark: string): string => `${whole}.${fraction.replace(/(.{5})(?=.)/g, `$1${mark}`)}`;
  return fc.constantFrom(
    digits,
    digits.replace('-', '−'),
    grouped(' '),
    grouped('_'),
    grouped('\u2009'),
    grouped("'"),
    grouped('\\\n'),
    `${whole}${fraction}e-${fraction.length}`,
    `${digits}E+0`,
    `${digits}d0`,
    `${digits}(7)`,
    digits.startsWith('-') ? digits : `+${digits}`,
  );
}

const label = fc.constantFrom(undefined, 'F1', 'master_3', 'I[1]');
const joint = fc.constantFrom(' = ', ': ', ' := ');

function labelled(value: fc.Arbitrary<Omit<Sample, 'label'>>): fc.Arbitrary<Sample> {
  return fc.tuple(value, label, joint).map(([v, name, mark]) => ({
    ...v,
    label: name,
    text: name === undefined ? v.text : `${name}${mark}${v.text}`,
  }));
}

const reals = plain.chain((d) => dressed(d).map((text) => ({ text, kind: 'real' as const, digits: [d] })));

const complexes = fc.tuple(plain, plain, fc.integer({ min: 0, max: 4 })).map(([a, b, form]) => {
  const sign = b.startsWith('-') ? ' - ' : ' + ';
  const size = b.replace('-', '');
  const text = [`(${a}, ${b})`, `${a} ${b}`, `${a}${sign}${size}*I`, `${a}${sign}I*${size}`, `${a}${sign}${size} i`][
    form
  ] as string;
  return { text, kind: 'complex' as const, digits: [a, b] };
});

const seriesTexts = fc
  .tuple(
    fc.array(plain, { minLength: 2, maxLength: 6 }),
    fc.integer({ min: -4, max: 0 }),
    fc.constantFrom('ep', 'eps', 'x'),
  )
  .map(([coefficients, low, name]) => {
    const power = (k: number): string =>
      k === 0 ? '' : k === 1 ? `*${name}` : k < 0 ? `*${name}^(${k})` : `*${name}^${k}`;
    // at least one written power of the variable
    const text = coefficients
      .map((c, k) => `${k === 0 ? c : c.startsWith('-') ? ` - ${c.slice(1)}` : ` + ${c}`}${power(low + k)}`)
      .join('');
    const order = low + coefficients.length;
    return { text: `${text} + O(${name}^${order})`, kind: 'series' as const, digits: coefficients, needs: name };
  })
  .map(({ text, kind, digits }) => ({ text, kind, digits }));

export const samples: fc.Arbitrary<Sample> = labelled(fc.oneof(reals, complexes, seriesTexts));

/** A sample spoilt in a way that no reading may accept. */
export const spoilt: fc.Arbitrary<{ readonly text: string }> = fc
  .tuple(
    plain,
    fc.constantFrom('§', '..', '.1.', '$', '0x', '?', ',5', '@', '1#', ' ± ± '),
    fc.double({ min: 0, max: 1, noNaN: true }),
  )
  .map(([digits, mark, at]) => {
    const point = digits.indexOf('.') + 1;
    const place = point + Math.max(1, Math.floor(at * (digits.length - point - 2)));
    return { text: `${digits.slice(0, place)}${mark}${digits.slice(place)}` };
  });
