import type { NodeSchema, QuantitySpec, SchemaName } from '../../schemas/format/types';
import { nearest } from '../quantity/nearest';
import { quantityExample, readQuantity } from '../quantity/read';
import { wantedAny } from '../quantity/units';
import type { ValuePath } from '../text/types';
import { freeName } from './free-name';
import { choicesOf, mappingOf } from './node-at';
import type { FormatFix, FormatProblem } from './problem';
import { kindOfValue, listed, nounOf, quote } from './say';

/** A value of the wrong kind: what is wanted there, in words, and the fixes that can be named. */
export function wrongType(path: ValuePath, node: NodeSchema, actual: unknown, name: SchemaName): FormatProblem {
  const wrong: Wrong = { path, node, actual, subject: subjectOf(path, name) };
  const isEmpty = actual === null || actual === undefined;
  const { message, fixes } = isEmpty ? empty(wrong, name) : wanted(wrong);
  return {
    rule: node['x-quantity'] && !isEmpty ? 'quantity' : 'schema',
    path,
    on: isEmpty && path.length > 0 ? 'entry' : 'value',
    message,
    fixes,
  };
}

interface Wrong {
  readonly path: ValuePath;
  readonly node: NodeSchema;
  readonly actual: unknown;
  /** How the message begins: `` `length` `` */
  readonly subject: string;
}
type Said = Pick<FormatProblem, 'message' | 'fixes'>;

function subjectOf(path: ValuePath, name: SchemaName): string {
  const last = path.at(-1);
  if (last === undefined) return nounOf(name).replace(/^a/, 'A');
  return typeof last === 'string' ? quote(last) : `Entry ${last + 1} of ${quote(String(path.at(-2) ?? name))}`;
}

const write = (path: ValuePath, text: string, more: Partial<FormatFix> = {}): FormatFix => ({
  title: `Write ${quote(text)}`,
  edits: [{ op: 'value', path, text }],
  ...more,
});

/** A key whose value is still to be typed. */
function empty({ path, node, subject }: Wrong, name: SchemaName): Said {
  if (path.length === 0 && (name === 'channel' || name === 'parts' || name === 'config')) return emptyFile(name);
  if (node['x-declares']) {
    const key = String(path.at(-1));
    const name = freeName(key);
    return {
      message: `This ${key} has no name yet: write \`${key}: ${name}\` or a better one.`,
      fixes: [write(path, name)],
    };
  }
  const example = node['x-quantity']
    ? quantityExample(node['x-quantity'], node.examples)
    : (node.examples?.[0] ?? choicesOf(node)[0]);
  return {
    message: `${subject} has no value yet${example === undefined ? '' : `; for example \`${example}\``}.`,
    fixes: example === undefined ? [] : [write(path, String(example), { title: `Write the example \`${example}\`` })],
  };
}

const emptyFile = (name: SchemaName): Said => ({
  message: `This file is empty: ${nounOf(name)} begins with \`lanewright: 1\`.`,
  fixes: [{ title: 'Add `lanewright: 1`', edits: [{ op: 'set', path: [], key: 'lanewright', text: '1' }] }],
});

function wanted(wrong: Wrong): Said {
  const { node, actual } = wrong;
  const spec = node['x-quantity'] ?? node.anyOf?.find((branch) => branch['x-quantity'])?.['x-quantity'];
  if (spec) return typeof actual === 'number' ? numberForQuantity(wrong, actual, spec) : notAQuantity(wrong, spec);
  const choices = choicesOf(node);
  return choices.length > 0 ? notAmong(wrong, choices) : otherType(wrong);
}

function numberForQuantity(wrong: Wrong, actual: number, spec: QuantitySpec): Said {
  const { problem } = readQuantity(actual, spec);
  if (!problem) return notAQuantity(wrong, spec);
  const fixes = (problem.fixes ?? []).map(
    ({ title, text }): FormatFix => ({ title, edits: [{ op: 'value', path: wrong.path, text }] }),
  );
  return { message: problem.message, fixes };
}

function notAQuantity({ subject, node, actual }: Wrong, spec: QuantitySpec): Said {
  const or = spec.list ? ' or a list of them' : mappingOf(node) ? ` or ${mappingInWords(node)}` : '';
  const example = quantityExample(spec, node.examples);
  return {
    message: `${subject} is ${wantedAny(spec.dimensions)}${or}, as \`${example}\`; this is ${kindOfValue(actual)}.`,
    fixes: [],
  };
}

function notAmong({ subject, path, node, actual }: Wrong, choices: readonly string[]): Said {
  const meant = typeof actual === 'string' ? nearest(actual, choices) : undefined;
  const fixes = meant
    ? [write(path, meant, { preferred: true })]
    : choices.slice(0, 5).map((choice) => write(path, choice));
  const names = choices.map((choice) => `\`${choice}\``);
  const all = mappingOf(node) ? [...names, mappingInWords(node)] : names;
  const guess = meant ? `; did you mean \`${meant}\`?` : `; this is ${kindOfValue(actual)}.`;
  return { message: `${subject} is ${listed(all, 'or')}${guess}`, fixes };
}

function otherType({ subject, path, node, actual }: Wrong): Said {
  const message = `${subject} is ${typeInWords(node)}; this is ${kindOfValue(actual)}.`;
  if (typeof actual === 'object') return { message, fixes: [] };
  if (node.type === 'string' && typeof actual !== 'string') return { message, fixes: [write(path, `"${actual}"`)] };
  if (node.type === 'array') return { message, fixes: [write(path, `[${actual}]`)] };
  return { message, fixes: underOneOfItsKeys(path, node, String(actual)) };
}

/** A bare value where a mapping says what it is: `roughness: 0.6 um`. */
function underOneOfItsKeys(path: ValuePath, node: NodeSchema, actual: string): FormatFix[] {
  return Object.entries(mappingOf(node)?.properties ?? {})
    .filter(([, child]) => child['x-quantity'] && readQuantity(actual, child['x-quantity']).quantity)
    .map(([key]) => write(path, `{ ${key}: ${actual} }`));
}

function typeInWords(node: NodeSchema): string {
  if (node.type === 'array') return `a list${counted(node)}${itemsInWords(node.items)}`;
  if (node.type === 'integer') return `a whole number${bounds(node)}`;
  if (node.type === 'number') return `a number${bounds(node)}`;
  if (node.type === 'string') return 'text';
  return mappingInWords(node);
}

function mappingInWords(node: NodeSchema): string {
  const keys = Object.keys(mappingOf(node)?.properties ?? {});
  return keys.length > 0 && keys.length < 8
    ? `a mapping with ${listed(
        keys.map((key) => `\`${key}\``),
        'or',
      )}`
    : 'a mapping';
}

function bounds({ minimum, maximum }: NodeSchema): string {
  if (minimum === undefined) return '';
  return maximum === undefined ? ` of at least ${minimum}` : ` from ${minimum} to ${maximum}`;
}

function counted({ minItems, maxItems }: NodeSchema): string {
  if (maxItems === undefined) return minItems ? ` of at least ${minItems}` : ' of';
  return minItems === maxItems ? ` of ${maxItems}` : ` of ${minItems ?? 0} to ${maxItems}`;
}

function itemsInWords(items: NodeSchema | undefined): string {
  if (items?.type === 'integer' || items?.type === 'number') return ' numbers';
  return items?.['x-refers'] ? ' names' : ' entries';
}
