/**
 * How often the verdicts are right, on numbers whose truth is known: node .ci/run-ts.mjs test/campaign/evidence.ts
 * [part=odds|random|planted|corrupted|dependent|problems|all] [scale=1] [seed=…]
 *
 * scale=1 is 10,000 random values, 5,000 planted relations, 1,000 corrupted values and 500 dependent bases. Values are
 * drawn from a ChaCha20 stream; planted relations are built from constants evaluated 30 digits further than they are
 * offered. The last part climbs
 * the ladder from each published value (sources in test/reference/problems-open.json); TABLE=FILE in the environment
 * writes its table there. `odds` counts chance agreements by trying every small integer vector.
 */
import { planted, random } from './evidence/chance.ts';
import { corrupted, dependent } from './evidence/damage.ts';
import { odds } from './evidence/odds.ts';
import { problems } from './evidence/problems.ts';
import { settings } from './evidence/settings.ts';

const parts = { odds, random, planted, corrupted, dependent, problems };
const { part, scale, seed } = settings(process.argv.slice(2));
let failed = 0;
for (const [name, run] of Object.entries(parts)) {
  if (part !== 'all' && part !== name) continue;
  const started = performance.now();
  const ok = await run({ scale, seed });
  if (!ok) failed += 1;
  console.log(`${name}: ${ok ? 'passed' : 'FAILED'} in ${((performance.now() - started) / 1000).toFixed(0)} s\n`);
}
console.log(failed === 0 ? 'All parts passed.' : `${failed} parts failed.`);
process.exitCode = failed === 0 ? 0 : 1;
