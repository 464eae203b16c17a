import type { NodeSchema, SchemaName } from '../../schemas/format/types';
import { nearest } from '../quantity/nearest';
import { quantityExample, readQuantity } from '../quantity/read';
import { wantedAny } from '../quantity/units';
import type { ValuePath } from '../text/types';
import { freeName } from './entry-kind';
import type { FormatFix } from './problem';
import { kindOfValue, listed, quote } from './say';

/** What is wanted at a key whose value is of the wrong kind, in words, with the fixes that can be named. */
export function wantedValue(
  path: ValuePath,
  node: NodeSchema,
  actual: unknown,
  name: SchemaName,
): { message: string; fixes: FormatFix[] } {
  const key = path.at(-1);
  const subject = typeof key === 'string' ? `\`${key}\`` : key === undefined ? `A ${name}` : 'Each entry of this list';
  const set = (text: string, preferred = false): FormatFix => ({
    title: `Change to \`${text}\``,
    edits: [{ op: 'value', path, text }],
    ...(preferred && { preferred }),
  });
  if (node['x-declares'] && (actual === null || actual === undefined)) {
    const own = freeName(String(key));
    return {
      message: `This ${key} has no name yet: write its own name, as \`${key}: ${own}\`.`,
      fixes: [{ title: `Name it \`${own}\``, edits: [{ op: 'value', path, text: own }] }],
    };
  }
  const spec = node['x-quantity'];
  if (actual === null || actual === undefined) {
    const example = spec ? quantityExample(spec, node.examples) : exampleOf(node);
    return { message: `${subject} has no value yet${example ? `; for example \`${example}\`` : ''}.`, fixes: [] };
  }
  if (spec && typeof actual === 'number') {
    const { problem } = readQuantity(actual, spec);
    if (problem)
      return {
        message: problem.message,
        fixes: (problem.fixes ?? []).map(({ title, text }) => ({ title, edits: [{ op: 'value', path, text }] })),
      };
  }
  if (spec)
    return {
      message: `${subject} takes ${wantedAny(spec.dimensions)}${spec.list ? ' or a list of them' : ''}, as \`${quantityExample(spec, node.examples)}\`; this is ${kindOfValue(actual)}.`,
      fixes: [],
    };
  const choices = choicesOf(node);
  if (choices.length > 0) {
    const meant = typeof actual === 'string' ? nearest(actual, choices) : undefined;
    const mapping = node.anyOf?.some((branch) => branch.properties) ? ', or a mapping' : '';
    const fixes = meant ? [set(meant, true)] : choices.slice(0, 5).map((choice) => set(choice));
    return {
      message: `${subject} is ${listed(
        choices.map((choice) => `\`${choice}\``),
        'or',
      )}${mapping}; ${kindOfValue(actual)} is not one of them.`,
      fixes,
    };
  }
  return {
    message: `${subject} is ${typeInWords(node)}; this is ${kindOfValue(actual)}.`,
    fixes: typeof actual === 'number' && node.type === 'string' ? [set(`"${actual}"`)] : wrapped(path, node, actual),
  };
}

/** One value where a list is wanted. */
function wrapped(path: ValuePath, node: NodeSchema, actual: unknown): FormatFix[] {
  if (node.type !== 'array' || typeof actual === 'object') return [];
  return [{ title: `Write \`[${actual}]\``, edits: [{ op: 'value', path, text: `[${actual}]` }] }];
}

function choicesOf(node: NodeSchema): string[] {
  if (node.enum) return node.enum.map(String);
  if (node.type === 'boolean') return ['true', 'false'];
  return (node.anyOf ?? [node]).filter((branch) => branch.const !== undefined).map((branch) => String(branch.const));
}

function exampleOf(node: NodeSchema): string | undefined {
  const example = node.examples?.[0] ?? choicesOf(node)[0];
  return example === undefined ? undefined : Array.isArray(example) ? `[${example.join(', ')}]` : String(example);
}

function typeInWords(node: NodeSchema): string {
  if (node.type === 'array') return `a list of ${counted(node)}${plural(node.items)}`;
  if (node.type === 'integer') return `a whole number${bounds(node)}`;
  if (node.type === 'number') return `a number${bounds(node)}`;
  if (node.type === 'string') return 'text';
  const keys = Object.keys(node.properties ?? {});
  return keys.length > 0 && keys.length < 8 ? `a mapping with ${listed(keys.map((key) => quote(key)))}` : 'a mapping';
}

const bounds = ({ minimum, maximum }: NodeSchema) =>
  minimum !== undefined && maximum !== undefined
    ? ` from ${minimum} to ${maximum}`
    : minimum !== undefined
      ? ` of at least ${minimum}`
      : '';

const counted = ({ minItems, maxItems }: NodeSchema) =>
  maxItems === undefined
    ? ''
    : minItems === maxItems
      ? `${maxItems} `
      : minItems
        ? `${minItems} to ${maxItems} `
        : `at most ${maxItems} `;

const plural = (items: NodeSchema | undefined) =>
  items?.type === 'integer' || items?.type === 'number' ? 'numbers' : items?.['x-refers'] ? 'names' : 'entries';
