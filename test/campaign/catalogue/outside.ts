/** PARI/GP and mpmath as outside references: many expressions in one process, each at its own precision. */
import { spawnSync } from 'node:child_process';

export interface Question {
  readonly expression: string;
  /** Significant decimal digits wanted. */
  readonly digits: number;
}

/** A decimal number mantissa·10^−places. */
export interface Decimal {
  readonly mantissa: bigint;
  readonly places: number;
}

export interface Answer {
  readonly re: Decimal;
  readonly im: Decimal;
}

/** Working digits of the outside programs beyond those compared. */
const EXTRA = 40;

export function readDecimal(text: string): Decimal | null {
  const match = /^(-?)(\d*)\.?(\d*)(?:\s*[eE]([+-]?\d+))?$/.exec(text.trim());
  if (match === null || `${match[2]}${match[3]}` === '') return null;
  const [, sign, whole = '', fraction = '', exponent = '0'] = match;
  const size = BigInt(whole + fraction) * (sign === '-' ? -1n : 1n);
  const places = fraction.length - Number(exponent);
  return places >= 0 ? { mantissa: size, places } : { mantissa: size * 10n ** BigInt(-places), places: 0 };
}

function readAnswers(output: string, count: number): (Answer | null)[] {
  const answers: (Answer | null)[] = Array.from({ length: count }, () => null);
  for (const line of output.split('\n')) {
    const [index = '', re = '', im = ''] = line.split('|');
    const a = readDecimal(re);
    const b = readDecimal(im);
    if (/^\d+$/.test(index) && a !== null && b !== null) answers[Number(index)] = { re: a, im: b };
  }
  return answers;
}

/** What PARI/GP answers, or null for all when it is not installed; a single null where it gave nothing. */
export function askPari(questions: readonly Question[], seconds: number): (Answer | null)[] | null {
  // A line of its own for the precision: literals take the precision that holds when their line is read.
  const lines = questions.map(
    ({ expression, digits }, j) =>
      `default(realprecision,${Math.ceil(1.2 * digits) + EXTRA});\niferr(z=1.*(${expression});print("${j}|",real(z),"|",imag(z)),E,print("${j}|",E));`,
  );
  const script = `default(parisizemax,"2G");\n${lines.join('\n')}\nquit\n`;
  const run = spawnSync('gp', ['-q'], { input: script, encoding: 'utf8', timeout: seconds * 1000, maxBuffer: 1 << 30 });
  if (run.error !== undefined && 'code' in run.error && run.error.code === 'ENOENT') return null;
  return readAnswers(run.stdout ?? '', questions.length);
}

/** The same with mpmath under the system's Python. */
export function askMpmath(questions: readonly Question[], seconds: number): (Answer | null)[] | null {
  const lines = questions.map(
    ({ expression, digits }, j) =>
      `mp.dps=${digits + EXTRA}\ntry:\n  z=mpmathify(${expression})\n  print(${j},nstr(re(z),mp.dps),nstr(im(z),mp.dps),sep='|',flush=True)\nexcept Exception as e:\n  pass`,
  );
  const script = `from mpmath import *\n${lines.join('\n')}\n`;
  const run = spawnSync('/usr/bin/python3', ['-'], {
    input: script,
    encoding: 'utf8',
    timeout: seconds * 1000,
    maxBuffer: 1 << 30,
  });
  const missing = run.error !== undefined && 'code' in run.error && run.error.code === 'ENOENT';
  if (missing || (run.stderr ?? '').includes('No module')) return null;
  return readAnswers(run.stdout ?? '', questions.length);
}
