/** JSON of values, read without ever turning digits into doubles. */
import { InputError, spotIn } from '../number/errors.ts';
import type { Entry } from './import.ts';

const NUMBER_OR_STRING = /"(?:[^"\\]|\\.)*"|-?\d+(?:\.\d+)?(?:[eE][+-]?\d+)?/g;

/**
 * Arrays of values, arrays of objects with `label` and `value`, or an object from label to value; a value is text, a number,
 * `{re, im}` or `[re, im]`. Throws InputError where the text is not JSON.
 */
export function jsonEntries(text: string): Entry[] {
  const found: Entry[] = [];
  collect(parse(text), undefined, found, new Finder(text));
  return found;
}

function parse(text: string): unknown {
  try {
    JSON.parse(text);
  } catch (error) {
    const position = Number(/position (\d+)/.exec((error as Error).message)?.[1] ?? text.length);
    const at = spotIn(text, Math.min(position, text.length));
    throw new InputError('bad-json', `The text begins like JSON but is not: line ${at.line}, column ${at.column}.`, at);
  }
  return JSON.parse(text.replace(NUMBER_OR_STRING, (token) => (token.startsWith('"') ? token : `"${token}"`)));
}

/** The line of each value: values are met in the order of the text. */
class Finder {
  private readonly text: string;
  private at = 0;
  private line = 1;

  constructor(text: string) {
    this.text = text;
  }

  lineOf(value: string): number {
    const found = this.text.indexOf(value, this.at);
    if (found < 0) return this.line;
    for (let k = this.at; k < found; k++) if (this.text[k] === '\n') this.line += 1;
    this.at = found;
    return this.line;
  }
}

function collect(node: unknown, label: string | undefined, found: Entry[], finder: Finder): void {
  if (typeof node === 'string') {
    found.push({ line: finder.lineOf(node), indent: 0, label, value: node });
    return;
  }
  if (Array.isArray(node)) {
    const items: unknown[] = node;
    if (label !== undefined && items.length === 2 && items.every((x) => typeof x === 'string')) {
      found.push({ line: finder.lineOf(String(items[0])), indent: 0, label, value: `(${items.join(',')})` });
      return;
    }
    for (const [k, item] of items.entries())
      collect(item, label === undefined ? undefined : `${label}[${k}]`, found, finder);
    return;
  }
  if (typeof node !== 'object' || node === null) return;
  const object = node as Readonly<Record<'label' | 'name' | 'id' | 're' | 'im' | 'value', unknown>>;
  const name = [object.label, object.name, object.id].find((x) => typeof x === 'string') as string | undefined;
  if (typeof object.re === 'string' && typeof object.im === 'string') {
    const value = `(${object.re},${object.im})`;
    found.push({ line: finder.lineOf(object.re), indent: 0, label: name ?? label, value });
  } else if ('value' in object) collect(object.value, name ?? label, found, finder);
  else
    for (const [key, value] of Object.entries(object))
      collect(value, label === undefined ? key : `${label}.${key}`, found, finder);
}
