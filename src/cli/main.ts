#!/usr/bin/env node
/** The headless command: JSON in, JSON out; exit 0 ok, 1 a negative answer, 2 bad input (one line on standard error). */
import { readFileSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { InputError } from '../number/errors.ts';
import { catalogue } from '../search/catalogue.ts';
import { checkRecord } from '../search/check.ts';
import type { SearchRequest } from '../search/request.ts';
import { runSearch } from '../search/run.ts';
import { evaluateToDigits } from '../worker/tasks.ts';
import { runBatch } from './batch.ts';

const USAGE = `usage:
  digit-assay search REQUEST.json|-             one record
  digit-assay evaluate 'EXPR' --digits N        digits, correctly rounded to N significant digits
  digit-assay check RECORD.json|-               recomputes everything from the record alone
  digit-assay batch REQUESTS.jsonl|- --out RECORDS.jsonl [--workers K] [--shard I/N] [--resume]
                                                a record a line, on all cores; goes on after an interruption
  digit-assay constants [--family KEY]          the catalogue as JSON`;

/** Largest file read, in bytes. */
const LARGEST_FILE = 64 * 1024 * 1024;

function readInput(path: string | undefined, what: string): string {
  if (path === undefined) throw new InputError('usage', `Name the ${what} file, or - for standard input.`);
  let bytes: Buffer;
  try {
    bytes = readFileSync(path === '-' ? 0 : path);
  } catch (error) {
    const reason =
      error instanceof Error && 'code' in error && error.code === 'ENOENT'
        ? 'there is no such file'
        : 'it cannot be read';
    throw new InputError('no-file', `${path}: ${reason}.`);
  }
  if (bytes.length > LARGEST_FILE) throw new InputError('too-large', `${path} is larger than 64 MiB.`);
  return bytes.toString('utf8');
}

function readJson(path: string | undefined, what: string): unknown {
  const text = readInput(path, what);
  try {
    return JSON.parse(text);
  } catch (error) {
    throw new InputError(
      'bad-json',
      `The ${what} is not valid JSON: ${error instanceof Error ? error.message : error}.`,
    );
  }
}

function readRequest(path: string | undefined): SearchRequest {
  const value = readJson(path, 'request');
  if (typeof value !== 'object' || value === null || Array.isArray(value)) {
    throw new InputError('bad-request', 'The request must be a JSON object with a value and a basis.');
  }
  if (typeof (value as { value?: unknown }).value === 'number') {
    throw new InputError('bad-value', 'Write the value as text in quotes: a JSON number keeps only about 16 digits.');
  }
  return value as SearchRequest;
}

function print(value: unknown): void {
  process.stdout.write(`${JSON.stringify(value, null, 2)}\n`);
}

async function search(path: string | undefined): Promise<number> {
  const record = await runSearch(readRequest(path));
  print(record);
  return record.outcome === 'relation' && record.verdict !== 'spurious' ? 0 : 1;
}

function evaluate(text: string | undefined, digits: string | undefined): number {
  if (text === undefined)
    throw new InputError('usage', "Give an expression, as in: digit-assay evaluate 'zeta(3)' --digits 50.");
  const found = evaluateToDigits(text, Number(digits ?? '50'));
  process.stdout.write(found.imaginary === null ? `${found.digits}\n` : `${found.digits}\n${found.imaginary}\n`);
  return 0;
}

async function check(path: string | undefined): Promise<number> {
  const result = await checkRecord(readJson(path, 'record'));
  print(result);
  return result.ok ? 0 : 1;
}

async function batch(
  path: string | undefined,
  options: { out?: string; workers?: string; shard?: string; resume?: boolean },
): Promise<number> {
  const { out, workers, shard, resume = false } = options;
  if (out === undefined) throw new InputError('usage', 'Name the file for the records with --out.');
  const result = await runBatch(readInput(path, 'requests'), { out, workers, shard, resume });
  print(result);
  if (result.failed > 0)
    throw new InputError(
      'failed-lines',
      `${result.failed} of ${result.requests} requests have no record; ${out} says why.`,
    );
  return result.negative > 0 ? 1 : 0;
}

async function main(args: readonly string[]): Promise<number> {
  const { values, positionals } = parseArgs({
    args: [...args],
    options: {
      digits: { type: 'string' },
      family: { type: 'string' },
      out: { type: 'string' },
      workers: { type: 'string' },
      shard: { type: 'string' },
      resume: { type: 'boolean' },
      help: { type: 'boolean', short: 'h' },
    },
    allowPositionals: true,
  });
  const [command, first, ...more] = positionals;
  if (values.help) {
    process.stdout.write(`${USAGE}\n`);
    return 0;
  }
  if (more.length > 0) throw new InputError('usage', `“${more[0]}” is one argument too many.`);
  switch (command) {
    case 'search':
      return search(first);
    case 'evaluate':
      return evaluate(first, values.digits);
    case 'check':
      return check(first);
    case 'batch':
      return batch(first, values);
    case 'constants':
      print(catalogue(values.family));
      return 0;
    default:
      throw new InputError(
        'usage',
        `${command === undefined ? 'Say what to do' : `There is no command “${command}”`}; digit-assay --help lists the commands.`,
      );
  }
}

try {
  process.exitCode = await main(process.argv.slice(2));
} catch (error) {
  const known = error instanceof InputError || (error instanceof TypeError && 'code' in error);
  const message = error instanceof Error ? error.message.split('\n')[0] : String(error);
  process.stderr.write(`digit-assay: ${known ? '' : 'internal error: '}${message}\n`);
  process.exitCode = 2;
}
