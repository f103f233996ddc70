/** KaTeX on demand, in slices short enough that the page stays responsive with hundreds of formulas. */

interface Katex {
  renderToString(latex: string, options: object): string;
}

interface Job {
  readonly latex: string;
  readonly display: boolean;
  readonly done: () => void;
}

const SLICE_MILLISECONDS = 10;
const MOST_KEPT = 2000;
const kept = new Map<string, string | null>();
const jobs: Job[] = [];
let katex: Promise<Katex> | undefined;
let working = false;

const keyOf = (latex: string, display: boolean): string => `${display ? 'D' : 'T'}${latex}`;

/** The HTML of a formula typeset earlier; null when it cannot be typeset, undefined when it has not been tried. */
export function typesetBefore(latex: string, display: boolean): string | null | undefined {
  return kept.get(keyOf(latex, display));
}

/** Resolves when `typesetBefore` knows the formula. */
export function typeset(latex: string, display: boolean): Promise<void> {
  return new Promise((done) => {
    jobs.push({ latex, display, done });
    if (!working) work();
  });
}

async function work(): Promise<void> {
  working = true;
  katex ??= Promise.all([import('katex'), import('katex/dist/katex.min.css')]).then(([module]) => module.default);
  const setter = await katex.catch(() => {
    katex = undefined;
    return null;
  });
  while (jobs.length > 0) {
    const end = performance.now() + SLICE_MILLISECONDS;
    for (let job = jobs.shift(); job !== undefined; job = performance.now() < end ? jobs.shift() : undefined) {
      const key = keyOf(job.latex, job.display);
      if (!kept.has(key)) {
        if (kept.size >= MOST_KEPT) kept.clear();
        kept.set(key, setter === null ? null : render(setter, job));
      }
      job.done();
    }
    await new Promise((next) => setTimeout(next, 0));
  }
  working = false;
}

function render(setter: Katex, { latex, display }: Job): string | null {
  try {
    const output = display ? 'htmlAndMathml' : 'html';
    return setter.renderToString(latex, {
      displayMode: display,
      output,
      throwOnError: true,
      trust: false,
      strict: 'ignore',
    });
  } catch {
    return null;
  }
}
