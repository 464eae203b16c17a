import type { NodeSchema, SchemaName } from '../../schemas/format/types';
import { reservedKeys } from '../../schemas/generated/format';
import type { SchemaError } from '../../schemas/generated/validators';
import { nearest } from '../quantity/nearest';
import { quantityExample } from '../quantity/read';
import type { ValuePath } from '../text/types';
import { mappingOf, nodeAt, pathOf, valueAt } from './node-at';
import type { FormatFix, FormatProblem } from './problem';
import { listed, nounOf, quote } from './say';
import { wrongType } from './wanted';
import { wrongName } from './wrong-name';

/** A validator's error in words, with its fixes; undefined for one that another says better. */
export function problemOf(error: SchemaError, name: SchemaName, value: unknown): FormatProblem | undefined {
  const path = pathOf(error.instancePath, value);
  if (error.keyword === 'propertyNames')
    return wrongName([...path, String(error.params.propertyName)], 'key', String(error.params.propertyName));
  const node = nodeAt(name, path);
  if (!node || error.schemaPath.includes('/propertyNames/')) return undefined;
  const holder: Holder = { path, node, noun: path.length === 0 ? nounOf(name) : `\`${String(path.at(-1))}\`` };
  const actual = valueAt(value, path);
  switch (error.keyword) {
    case 'additionalProperties':
      return unknownKey(holder, String(error.params.additionalProperty), actual);
    case 'required':
      return missingKey(holder, String(error.params.missingProperty), name);
    case 'not':
      return sameTwice(holder);
    case 'minProperties':
    case 'maxProperties':
      return oneOfItsKeys(holder);
    case 'pattern':
      return wrongPattern(path, node, String(actual));
    default:
      return wrongType(path, node, actual, name);
  }
}

/** The mapping that an error is about. */
interface Holder {
  readonly path: ValuePath;
  readonly node: NodeSchema;
  /** `a trace`, `\`ctle\`` */
  readonly noun: string;
}

const known = ({ node }: Holder): Readonly<Record<string, NodeSchema>> => mappingOf(node)?.properties ?? {};

function unknownKey(holder: Holder, key: string, actual: unknown): FormatProblem {
  const path = [...holder.path, key];
  const remove: FormatFix = { title: `Remove ${quote(key)}`, edits: [{ op: 'remove', path }] };
  if (reservedKeys.includes(key)) {
    return {
      rule: 'reserved-key',
      path,
      on: 'key',
      message: `\`${key}\` is not used in this version.`,
      fixes: [remove],
    };
  }
  const message = `${quote(key)} is not a key of ${holder.noun}`;
  const meant = nearest(key, Object.keys(known(holder)));
  const begun = beginsKeys(holder, key, actual);
  if (!meant && begun.length > 0) {
    const names = listed(
      begun.map((name) => `\`${name}\``),
      'or',
    );
    const fixes = begun.map((name) => completed(holder, path, name));
    return { rule: 'schema', path, on: 'key', message: `${message}; did you mean ${names}?`, fixes };
  }
  if (!meant) return { rule: 'schema', path, on: 'key', message: `${message}.`, fixes: [remove] };
  const rename: FormatFix = {
    title: `Change to \`${meant}\``,
    edits: [{ op: 'key', path, name: meant }],
    preferred: true,
    safe: true,
  };
  return { rule: 'schema', path, on: 'key', message: `${message}; did you mean \`${meant}\`?`, fixes: [rename] };
}

const MOST_BEGUN = 3;

/** A key that is only begun and has no value: `len`. */
function beginsKeys(holder: Holder, key: string, actual: unknown): string[] {
  const value = valueAt(actual, [key]);
  if (key === '' || (value !== null && value !== undefined)) return [];
  const begun = Object.keys(known(holder)).filter(
    (name) => name.startsWith(key) && valueAt(actual, [name]) === undefined,
  );
  return begun.length > MOST_BEGUN ? [] : begun;
}

/** The key in full, with its example where it has one. */
function completed(holder: Holder, path: ValuePath, name: string): FormatFix {
  const child = known(holder)[name];
  const text = child['x-quantity'] ? quantityExample(child['x-quantity'], child.examples) : child.examples?.[0];
  const rename = { op: 'key', path, name } as const;
  if (typeof text !== 'string') return { title: `Write \`${name}\``, edits: [rename] };
  return {
    title: `Write \`${name}\` with the example \`${text}\``,
    edits: [rename, { op: 'value', path, text }],
  };
}

const isFile = (name: SchemaName) => name === 'channel' || name === 'parts' || name === 'config';

function missingKey(holder: Holder, key: string, name: SchemaName): FormatProblem {
  const child = Object.hasOwn(known(holder), key) ? known(holder)[key] : undefined;
  const example = child?.examples?.[0] ?? child?.const;
  const fixes: FormatFix[] =
    example === undefined
      ? []
      : [
          {
            title: `Add \`${key}: ${example}\``,
            edits: [
              {
                op: 'set',
                path: holder.path,
                key,
                text: String(example),
                ...(key === 'lanewright' && { first: true }),
              },
            ],
          },
        ];
  const message = `${holder.noun.replace(/^a/, 'A')} lacks \`${key}\`${example === undefined ? '' : `, as \`${key}: ${example}\``}.`;
  // a file that lacks a key is marked at its first line, not from end to end
  const on = holder.path.length === 0 && isFile(name) ? 'value' : 'entry';
  return { rule: 'schema', path: holder.path, on, message, fixes, lacks: key };
}

/** Two keys for one thing. */
function sameTwice({ path, node }: Holder): FormatProblem | undefined {
  const keys = mappingOf(node)?.not?.required;
  if (!keys) return undefined;
  const fixes = keys.map(
    (key): FormatFix => ({ title: `Remove \`${key}\``, edits: [{ op: 'remove', path: [...path, key] }] }),
  );
  const names = listed(keys.map((key) => `\`${key}\``));
  return {
    rule: 'schema',
    path: [...path, keys[keys.length - 1]],
    on: 'key',
    message: `${names} say the same thing: keep one.`,
    fixes,
  };
}

function oneOfItsKeys(holder: Holder): FormatProblem {
  const names = listed(
    Object.keys(known(holder)).map((key) => `\`${key}\``),
    'or',
  );
  return { rule: 'schema', path: holder.path, on: 'value', message: `${holder.noun} has one of ${names}.`, fixes: [] };
}

function wrongPattern(path: ValuePath, node: NodeSchema, actual: string): FormatProblem {
  if (node['x-declares'] || node['x-refers']) return wrongName(path, 'value', actual, node);
  const example = node.examples?.[0];
  const as = example === undefined ? '' : `, as \`${example}\``;
  return {
    rule: 'schema',
    path,
    on: 'value',
    message: `${quote(actual)} is not how \`${path.at(-1)}\` is written${as}: ${node.description}`,
    fixes: [],
  };
}
