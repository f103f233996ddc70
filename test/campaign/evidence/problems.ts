/** The ladder climbed from each published value. */
import { readFileSync, writeFileSync } from 'node:fs';
import { ladderBases } from '../../../src/search/ladder.ts';
import { createPlan } from '../../../src/search/plan-run.ts';
import { runSearch } from '../../../src/search/run.ts';
import { cache } from './settings.ts';

interface Problem {
  readonly id: string;
  readonly value?: string;
  readonly form: string;
  readonly basis?: readonly string[];
}

/** Weight of the published relation, as far as the reading goes: exponents and arguments of ζ, Li, Cl, L. */
const WEIGHTS: Readonly<Record<string, number>> = {
  'qed-two-loop': 3,
  'qed-three-loop': 5,
  'euler-sum-quadratic': 4,
  'euler-sum-linear-5': 6,
  'phi4-six-loop-double-zeta': 8,
  'central-binomial-4': 4,
  'central-binomial-3': 3,
  'log-cubed-integral': 4,
  'log-cosine-squared': 3,
  'log-sine-4-third': 4,
  'massive-vacuum-log': 2,
  'mahler-three-term': 2,
  'bessel-k0-cubed': 2,
  'sunrise-massless-eps': 4,
  'sunrise-massless-eps5': 5,
  'mzv-weight8-word': 8,
  'alternating-weight5': 5,
  'golden-dilog': 2,
  'watson-simple-cubic': 1,
  'unit-cube-distance': 1,
  'degree-30-algebraic': 1,
};

const ABOUT = `# Published values by the ladder

Each value of \`test/reference/problems-open.json\` (sources there), searched from its digits and "weight at most its weight" alone: bases grow by weight and alphabet until one holds. The rungs were laid out knowing these problems, so this is a check and not a blind test. Written by \`TABLE=docs/ladder.md npm run campaign:evidence -- part=problems\`; seconds are of one run on a shared two-core machine.`;

/** Prints the table of the project's docs; `TABLE=FILE` in the environment writes it there as well. */
export async function problems(): Promise<boolean> {
  const { problems: all } = JSON.parse(readFileSync('test/reference/problems-open.json', 'utf8')) as {
    problems: Problem[];
  };
  const rows: string[] = [];
  let missed = 0;
  for (const { id, value, form } of all) {
    if (value === undefined) continue;
    const weight = WEIGHTS[id] ?? 4;
    const started = performance.now();
    const plan = createPlan(
      { kind: 'ladder', value: { name: id, value }, bases: ladderBases(weight) },
      { execute: (request, { signal }) => runSearch(request, { cache, signal }) },
    );
    await plan.start();
    const states = plan.steps.map((step) => ({ step, state: plan.state(step.key) }));
    for (const { step, state } of states) if (state.kind === 'failed') console.log(`  ${step.title}: ${state.reason}`);
    const hit = states.find(({ state }) => state.kind === 'done' && state.record.verdict === 'holds');
    const record = hit?.state.kind === 'done' ? hit.state.record : null;
    const climbed = states.filter(({ state }) => state.kind === 'done').length;
    const seconds = ((performance.now() - started) / 1000).toFixed(1);
    if (record === null) missed += 1;
    const rung = hit?.step.title.replace(`${id}: `, '') ?? 'none';
    rows.push(
      `| ${id} | ${form} | ${weight} | ${climbed} | ${rung} | ${record?.surplusDigits?.toFixed(0) ?? ''} | ${seconds} |`,
    );
    console.log(`  ${rows.at(-1)}`);
  }
  const head =
    '| problem | form | weight ≤ | searches | rung that holds | surplus digits | seconds |\n|---|---|---|---|---|---|---|';
  const table = `${head}\n${rows.join('\n')}\n`;
  if (process.env.TABLE !== undefined) writeFileSync(process.env.TABLE, `${ABOUT}\n\n${table.trim()}\n`);
  console.log(`  ${rows.length} problems, ${missed} not recognised`);
  return missed === 0;
}
