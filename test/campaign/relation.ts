/**
 * Campaign of the relation engine: node .ci/run-ts.mjs test/campaign/relation.ts [--count 2000] [--seed TEXT] [--only planted|random|mixed|real]
 *
 * Planted relations over 2 … 100 numbers must all be found from 1.1 times the information limit on; random numbers must give
 * no relation, and every norm bound must stay below the truth; both methods must agree wherever both ran; and the problems
 * of test/reference must be solved from outside digits. The seed feeds ChaCha20 and is printed, so that a run can be repeated.
 */
import { randomBytes } from 'node:crypto';
import { mixedCampaign } from './relation/mixed.ts';
import { plantedCampaign } from './relation/planted.ts';
import { randomCampaign } from './relation/random.ts';
import { realCampaign } from './relation/real.ts';

function option(name: string): string | undefined {
  const at = process.argv.indexOf(`--${name}`);
  return at < 0 ? undefined : process.argv[at + 1];
}

const count = Number(option('count') ?? 2000);
const seed = option('seed') ?? randomBytes(8).toString('hex');
const only = option('only');
console.log(`relation campaign: seed ${seed}, count ${count}`);
const failures = [
  ...(only === undefined || only === 'planted' ? plantedCampaign(seed, count) : []),
  ...(only === undefined || only === 'random' ? randomCampaign(seed, count) : []),
  ...(only === undefined || only === 'mixed' ? mixedCampaign(seed, count) : []),
  ...(only === undefined || only === 'real' ? realCampaign() : []),
];
for (const failure of failures) console.log(`FAILED: ${failure}`);
console.log(failures.length === 0 ? 'all as it must be' : `${failures.length} failures`);
process.exit(failures.length === 0 ? 0 : 1);
