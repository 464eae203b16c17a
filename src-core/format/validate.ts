import type { NodeSchema, SchemaName } from '../../schemas/format/types';
import { reservedKeys, schemas } from '../../schemas/generated/format';
import { type SchemaError, validators } from '../../schemas/generated/validators';
import { nearest } from '../quantity/nearest';
import type { ValuePath } from '../text/types';
import { nameProblem } from './entry-kind';
import type { FormatFix, FormatProblem } from './problem';
import { isMapping, kindOfValue, listed, quote, withArticle } from './say';
import { wantedValue } from './wanted';

/** More says nothing new. */
const MOST_PROBLEMS = 200;

/**
 * Checks a mapping against the schema of its kind: unknown, missing and reserved keys, wrong types. Quantities are text here;
 * `readValues` reads them. One problem a place.
 */
export function validateEntry(name: SchemaName, value: unknown): FormatProblem[] {
  const schema = schemas[name];
  if (!isMapping(value)) return [wrongType([], schema, value, name)];
  const validate = validators[name];
  if (validate(value)) return [];
  const found = new Map<string, FormatProblem>();
  for (const error of withoutOtherBranches(validate.errors ?? [], value)) {
    const problem = problemOf(error, name, value);
    if (!problem) continue;
    const place = JSON.stringify([problem.path, problem.on === 'entry' ? problem.message : problem.on]);
    if (!found.has(place)) found.set(place, problem);
    if (found.size >= MOST_PROBLEMS) break;
  }
  return [...found.values()];
}

/** Where alternatives failed, those errors that belong to the one that was meant: a mapping means the alternative with keys. */
function withoutOtherBranches(errors: readonly SchemaError[], value: unknown): SchemaError[] {
  const alternatives = errors.filter((error) => error.keyword === 'anyOf');
  return errors.filter((error) => {
    const choice = alternatives.find((one) => error !== one && error.schemaPath.startsWith(`${one.schemaPath}/`));
    if (!choice) {
      if (error.keyword !== 'anyOf') return true;
      return !isMapping(valueAt(value, pathOf(error.instancePath, value))) || !hasNestedErrors(error, errors);
    }
    return isMapping(valueAt(value, pathOf(choice.instancePath, value))) && !isTypeErrorOf(error, choice);
  });
}

const isTypeErrorOf = (error: SchemaError, choice: SchemaError) =>
  error.instancePath === choice.instancePath && (error.keyword === 'type' || error.keyword === 'const');

const hasNestedErrors = (choice: SchemaError, errors: readonly SchemaError[]) =>
  errors.some((error) => error.schemaPath.startsWith(`${choice.schemaPath}/`) && !isTypeErrorOf(error, choice));

/** A JSON Pointer as a path of this value: list indices as numbers. */
function pathOf(pointer: string, value: unknown): (string | number)[] {
  const path: (string | number)[] = [];
  let here = value;
  for (const step of pointer.split('/').slice(1)) {
    const key = step.replaceAll('~1', '/').replaceAll('~0', '~');
    path.push(Array.isArray(here) ? Number(key) : key);
    here = valueAt(here, [path[path.length - 1]]);
  }
  return path;
}

function valueAt(value: unknown, path: ValuePath): unknown {
  let here = value;
  for (const step of path) {
    if (typeof here !== 'object' || here === null || !Object.hasOwn(here, step)) return undefined;
    here = (here as Record<string | number, unknown>)[step];
  }
  return here;
}

/** The schema's node at a path of this value, the alternative with keys where there are several. */
function nodeAt(name: SchemaName, path: ValuePath): NodeSchema | undefined {
  let node: NodeSchema | undefined = schemas[name];
  for (const step of path) {
    const holder: NodeSchema | undefined = node?.properties
      ? node
      : (node?.anyOf?.find((branch) => (typeof step === 'number' ? branch.items : branch.properties)) ?? node);
    if (typeof step === 'number') node = holder?.items;
    else if (holder?.properties) node = Object.hasOwn(holder.properties, step) ? holder.properties[step] : undefined;
    else node = Object.values(holder?.patternProperties ?? {})[0];
  }
  return node;
}

function problemOf(error: SchemaError, name: SchemaName, value: unknown): FormatProblem | undefined {
  const path = pathOf(error.instancePath, value);
  const node = nodeAt(name, path);
  const holder = titleOf(node, path, name);
  if (error.keyword === 'additionalProperties')
    return unknownKey(path, String(error.params.additionalProperty), node, holder);
  if (error.keyword === 'required') return missingKey(path, String(error.params.missingProperty), node, holder);
  if (error.keyword === 'propertyNames')
    return wrongName([...path, String(error.params.propertyName)], 'key', String(error.params.propertyName));
  if (!node || error.schemaPath.includes('/propertyNames/')) return undefined;
  const actual = valueAt(value, path);
  if (error.keyword === 'pattern' && typeof actual === 'string') return wrongName(path, 'value', actual, node);
  return wrongType(path, node, actual, name);
}

const titleOf = (node: NodeSchema | undefined, path: ValuePath, name: SchemaName): string =>
  node?.title ?? node?.anyOf?.find((branch) => branch.title)?.title ?? String(path.at(-1) ?? name);

/** Its keys are names of one's own, so that `a channel`, not `channel`, is said of the whole. */
const ofA = (holder: string) =>
  withArticle(holder.replace(/^parts$/, 'parts file').replace(/^config$/, 'configuration'));

function unknownKey(path: ValuePath, key: string, node: NodeSchema | undefined, holder: string): FormatProblem {
  const at = [...path, key];
  const remove: FormatFix = { title: `Remove ${quote(key)}`, edits: [{ op: 'remove', path: at }] };
  if (reservedKeys.includes(key)) {
    return {
      rule: 'reserved-key',
      path: at,
      on: 'key',
      message: `\`${key}\` is not used in this version.`,
      fixes: [remove],
    };
  }
  const known = Object.keys(node?.properties ?? node?.anyOf?.find((branch) => branch.properties)?.properties ?? {});
  const meant = nearest(key, known);
  if (!meant)
    return {
      rule: 'schema',
      path: at,
      on: 'key',
      message: `${quote(key)} is not a key of ${ofA(holder)}.`,
      fixes: [remove],
    };
  const rename: FormatFix = {
    title: `Change to \`${meant}\``,
    edits: [{ op: 'key', path: at, name: meant }],
    preferred: true,
    safe: true,
  };
  return {
    rule: 'schema',
    path: at,
    on: 'key',
    message: `${quote(key)} is not a key of ${ofA(holder)}; did you mean \`${meant}\`?`,
    fixes: [rename],
  };
}

function missingKey(path: ValuePath, key: string, node: NodeSchema | undefined, holder: string): FormatProblem {
  const mapping = node?.properties ? node : node?.anyOf?.find((branch) => branch.properties);
  const child = mapping?.properties?.[key];
  const example = child?.examples?.[0] ?? child?.const;
  const fixes: FormatFix[] =
    example === undefined
      ? []
      : [{ title: `Add \`${key}: ${example}\``, edits: [{ op: 'set', path, key, text: String(example) }] }];
  const purpose = child?.description
    ? ` (${child.description.replace(/\.$/, '').replace(/^[A-Z](?=[a-z])/, (letter) => letter.toLowerCase())})`
    : '';
  return {
    rule: 'schema',
    path,
    on: 'entry',
    message: `\`${key}\` is missing${purpose}; ${ofA(holder)} needs it.`,
    fixes,
  };
}

function wrongName(path: ValuePath, on: 'key' | 'value', name: string, node?: NodeSchema): FormatProblem {
  const layer = node?.['x-declares'] === 'layer' || node?.['x-refers'] === 'layer';
  if (layer) {
    const suggestion =
      name
        .slice(0, 60)
        .replace(/[^A-Za-z0-9_.-]+/g, '-')
        .replace(/^[^A-Za-z0-9]+/, '') || 'L1';
    const message = `${quote(name)} cannot be a layer’s name: it is letters, digits, \`_\`, \`.\` and \`-\`, beginning with a letter or digit.`;
    return {
      rule: 'schema',
      path,
      on,
      message,
      fixes: [{ title: `Change to \`${suggestion}\``, edits: [{ op: 'value', path, text: suggestion }] }],
    };
  }
  const wrong = nameProblem(name);
  const suggestion = wrong?.suggestion ?? 'name';
  const edit =
    on === 'key'
      ? ({ op: 'key', path, name: suggestion } as const)
      : ({ op: 'value', path, text: suggestion } as const);
  return {
    rule: 'schema',
    path,
    on,
    message: wrong?.message ?? `${quote(name)} cannot be a name.`,
    fixes: [{ title: `Change to \`${suggestion}\``, edits: [edit] }],
  };
}

function wrongType(path: ValuePath, node: NodeSchema, actual: unknown, name: SchemaName): FormatProblem {
  const { message, fixes } = wantedValue(path, node, actual, name);
  return {
    rule: node['x-quantity'] && actual !== null ? 'quantity' : 'schema',
    path,
    on: actual === null && path.length > 0 ? 'entry' : 'value',
    message,
    fixes,
  };
}

export { kindOfValue, listed };
