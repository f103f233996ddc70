/** Many requests on all cores: a JSON object a line in, a record a line out, in the order in which they end. */
import { appendFileSync, existsSync, readFileSync, writeFileSync } from 'node:fs';
import { availableParallelism } from 'node:os';
import { Worker } from 'node:worker_threads';
import { InputError } from '../number/errors.ts';
import type { SearchRecord } from '../search/record.ts';
import type { SearchRequest } from '../search/request.ts';
import { createEngineClient, type EngineClient, type Spawn } from '../worker/client.ts';
import type { FromWorker } from '../worker/messages.ts';

export interface BatchOptions {
  readonly out: string;
  readonly workers?: string | undefined;
  readonly shard?: string | undefined;
  readonly resume: boolean;
}

/** A line of the output: a record with the number of its request's line, or why there is none. */
type Answer =
  | ({ readonly line: number } & SearchRecord)
  | { readonly line: number; readonly error: { readonly code: string; readonly message: string } };

interface Job {
  readonly line: number;
  readonly text: string;
}

export interface BatchSummary {
  /** Requests of this shard, and how many of them were answered by an earlier run. */
  readonly requests: number;
  readonly earlier: number;
  readonly holds: number;
  readonly tentative: number;
  readonly negative: number;
  readonly failed: number;
}

/**
 * Answers every request of the shard that the output does not answer yet. Each answer is written as soon as it is there,
 * so that an interrupted batch goes on with `resume`. Throws InputError for options that cannot be carried out and for
 * an output that exists (without `resume`) or belongs to other requests (with it).
 */
export async function runBatch(requests: string, options: BatchOptions): Promise<BatchSummary> {
  const workers = wholeNumber(options.workers, availableParallelism(), 'workers');
  const jobs = ofShard(jobsOf(requests), options.shard);
  const answers = earlierAnswers(jobs, options);
  try {
    appendFileSync(options.out, '');
  } catch {
    throw new InputError('cannot-write', `${options.out} cannot be written.`);
  }
  const open = jobs.filter((job) => !answers.some((answer) => answer.line === job.line));
  const earlier = answers.length;
  const client = createEngineClient(spawnThread, Math.min(workers, Math.max(1, open.length)));
  try {
    await Promise.all(
      open.map(async (job) => {
        const answer = await answerTo(job, client);
        answers.push(answer);
        appendFileSync(options.out, `${JSON.stringify(answer)}\n`);
      }),
    );
  } finally {
    client.close();
  }
  return summary(answers, jobs.length, earlier);
}

/** The thread's file lies beside the command's. */
const spawnThread: Spawn = ({ onMessage, onDeath }) => {
  const here = import.meta.url;
  const worker = new Worker(new URL('engine-thread.js', here));
  worker.on('message', (message: FromWorker) => onMessage(message));
  worker.on('error', (error) => onDeath(error.message));
  worker.on('exit', (code) => onDeath(`The thread ended with code ${code}.`));
  return { post: (message) => worker.postMessage(message), terminate: () => void worker.terminate() };
};

function jobsOf(requests: string): Job[] {
  return requests.split('\n').flatMap((text, k) => (text.trim() === '' ? [] : [{ line: k + 1, text }]));
}

function wholeNumber(text: string | undefined, fallback: number, name: string): number {
  if (text === undefined) return fallback;
  if (!/^[1-9][0-9]{0,2}$/.test(text))
    throw new InputError('usage', `--${name} takes a whole number from 1 to 999, not “${text}”.`);
  return Number(text);
}

function ofShard(jobs: readonly Job[], shard: string | undefined): readonly Job[] {
  if (shard === undefined) return jobs;
  const [, part, parts] = (/^([1-9][0-9]{0,5})\/([1-9][0-9]{0,5})$/.exec(shard) ?? []).map(Number);
  if (part === undefined || parts === undefined || part > parts)
    throw new InputError('usage', `--shard takes I/N with I from 1 to N, for example 2/5, not “${shard}”.`);
  return jobs.filter((_, k) => k % parts === part - 1);
}

function earlierAnswers(jobs: readonly Job[], { out, resume }: BatchOptions): Answer[] {
  if (!existsSync(out)) return [];
  const lines = readFileSync(out, 'utf8').split('\n');
  if (lines.every((line) => line.trim() === '')) return [];
  if (!resume)
    throw new InputError('exists', `${out} exists already; go on with --resume, or name another file for the output.`);
  // What an interrupted run left of its last line is written again.
  const whole = lines.slice(0, -1).filter((line) => line.trim() !== '');
  const answers = whole.map((line) => readAnswer(line, out));
  const asked = new Map(jobs.map((job) => [job.line, job.text]));
  for (const answer of answers) {
    const text = asked.get(answer.line);
    const same = text !== undefined && ('error' in answer || canonical(text) === JSON.stringify(answer.request));
    if (!same)
      throw new InputError(
        'other-requests',
        `${out} answers another request for line ${answer.line}; name another file.`,
      );
  }
  if (lines.at(-1) !== '') writeFileSync(out, whole.map((line) => `${line}\n`).join(''));
  return answers;
}

function readAnswer(line: string, out: string): Answer {
  try {
    const answer = JSON.parse(line) as Answer;
    if (Number.isInteger(answer.line)) return answer;
  } catch {
    // Said below, as for a line without its number.
  }
  throw new InputError('not-records', `${out} holds a line that is not an answer of a batch.`);
}

function canonical(text: string): string {
  return JSON.stringify(parsed(text));
}

/** The request of a line. Throws InputError. */
function parsed(text: string): SearchRequest {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    throw new InputError('bad-json', 'The line is not valid JSON.');
  }
  if (typeof value !== 'object' || value === null || Array.isArray(value))
    throw new InputError('bad-request', 'The line is not a JSON object with a value and a basis.');
  if (typeof (value as { value?: unknown }).value === 'number')
    throw new InputError('bad-value', 'The value must be text in quotes: a JSON number keeps only about 16 digits.');
  return value as SearchRequest;
}

async function answerTo({ line, text }: Job, client: EngineClient): Promise<Answer> {
  try {
    return { line, ...(await client.call('search', parsed(text))) };
  } catch (error) {
    const code = error instanceof InputError ? error.code : 'internal';
    return { line, error: { code, message: error instanceof Error ? error.message : String(error) } };
  }
}

function summary(answers: readonly Answer[], requests: number, earlier: number): BatchSummary {
  const failed = answers.filter((a) => 'error' in a).length;
  const verdicts = answers.map((a) => ('error' in a ? null : a.verdict));
  const holds = verdicts.filter((v) => v === 'holds').length;
  const tentative = verdicts.filter((v) => v === 'tentative').length;
  return { requests, earlier, holds, tentative, negative: answers.length - failed - holds - tentative, failed };
}
