import type { NodeSchema, SchemaName, ValuesOf } from '../../schemas/format/types';
import { FORMAT_VERSION } from '../../schemas/format/version';
import { schemas } from '../../schemas/generated/format';
import type { QuantityProblem } from '../quantity/problem';
import { readBand, readQuantity } from '../quantity/read';
import type { ValuePath } from '../text/types';
import type { FormatProblem } from './problem';
import { isMapping } from './say';
import { validateEntry } from './validate';

export interface ReadOptions {
  /** Half the symbol rate, where it is known: lets the fix of a wrong `@ nyquist` write the frequency. */
  readonly nyquistHz?: number;
}

/**
 * Checks a mapping against the schema of its kind and reads its quantities.
 * @param raw what YAML gave
 * @returns `values` in the schema's shape, without the keys that are bad; a problem for each of those, with its path in `raw`
 */
export function readValues<Name extends SchemaName>(
  name: Name,
  raw: unknown,
  options: ReadOptions = {},
): { values: Partial<ValuesOf<Name>>; problems: FormatProblem[] } {
  const problems = [...validateEntry(name, raw), ...versionProblems(raw, name)];
  const bad = new Set(problems.filter(({ on }) => on !== 'key').map(({ path }) => JSON.stringify(path)));
  const reader: Reader = { bad, problems, options };
  const values = isMapping(raw) ? (readNode(reader, schemas[name], raw, []) ?? {}) : {};
  return { values: values as Partial<ValuesOf<Name>>, problems };
}

interface Reader {
  readonly bad: ReadonlySet<string>;
  readonly problems: FormatProblem[];
  readonly options: ReadOptions;
}

function versionProblems(raw: unknown, name: SchemaName): FormatProblem[] {
  if (!(name === 'channel' || name === 'parts' || name === 'config') || !isMapping(raw)) return [];
  const version = raw.lanewright;
  if (typeof version !== 'number' || !Number.isInteger(version) || version === FORMAT_VERSION) return [];
  const message =
    version > FORMAT_VERSION
      ? `This file is written in format version ${version}; this release reads version ${FORMAT_VERSION}. Nothing is computed.`
      : `There is no format version ${version}; write ${FORMAT_VERSION}.`;
  const fixes = [
    {
      title: `Change to ${FORMAT_VERSION}`,
      edits: [{ op: 'value' as const, path: ['lanewright'], text: String(FORMAT_VERSION) }],
    },
  ];
  return [
    {
      rule: 'format-version',
      path: ['lanewright'],
      on: 'value',
      message,
      fixes: version > FORMAT_VERSION ? [] : fixes,
    },
  ];
}

/** The value as read; undefined where it is bad. */
function readNode(reader: Reader, node: NodeSchema, raw: unknown, path: ValuePath): unknown {
  if (raw === null || raw === undefined || (path.length > 0 && reader.bad.has(JSON.stringify(path)))) return undefined;
  const spec = node['x-quantity'];
  if (spec?.band) return noted(reader, path, readBand(String(raw), spec), 'band');
  if (spec?.list) {
    const items = Array.isArray(raw) ? raw : [raw];
    const read = items.map((item, index) =>
      readScalar(
        reader,
        { ...node, 'x-quantity': { ...spec, list: !Array.isArray(raw) } },
        item,
        Array.isArray(raw) ? [...path, index] : path,
      ),
    );
    return read.includes(undefined) ? undefined : read;
  }
  if (spec) return readScalar(reader, node, raw, path);
  if (node.anyOf) return readNode(reader, node.anyOf.find((branch) => fits(branch, raw)) ?? {}, raw, path);
  if (isMapping(raw) && (node.properties || node.patternProperties)) return readMapping(reader, node, raw, path);
  if (Array.isArray(raw) && node.items) {
    const read = raw.map((item, index) => readNode(reader, node.items!, item, [...path, index]));
    return reader.problems.length > 0 && Object.keys(node.items).length > 0
      ? read.includes(undefined)
        ? undefined
        : read
      : raw;
  }
  return raw;
}

const fits = (branch: NodeSchema, raw: unknown) =>
  isMapping(raw)
    ? branch.properties !== undefined
    : branch.properties === undefined && (branch.const === undefined || branch.const === raw);

function readMapping(reader: Reader, node: NodeSchema, raw: Record<string, unknown>, path: ValuePath) {
  const values: Record<string, unknown> = Object.create(null);
  const underAnyName = node.properties ? undefined : Object.values(node.patternProperties ?? {})[0];
  for (const [key, value] of Object.entries(raw)) {
    const child = node.properties && Object.hasOwn(node.properties, key) ? node.properties[key] : underAnyName;
    const read = child && readNode(reader, child, value, [...path, key]);
    if (read !== undefined) values[key] = read;
  }
  return values;
}

function readScalar(reader: Reader, node: NodeSchema, raw: unknown, path: ValuePath) {
  if (reader.bad.has(JSON.stringify(path))) return undefined;
  if (typeof raw !== 'string' && typeof raw !== 'number') return undefined;
  return noted(reader, path, readQuantity(raw, node['x-quantity']!, reader.options), 'quantity');
}

function noted<Key extends string, T>(
  reader: Reader,
  path: ValuePath,
  result: { [K in Key]?: T } & { problem?: QuantityProblem },
  key: Key,
): T | undefined {
  const { problem } = result;
  if (problem) {
    const fixes = (problem.fixes ?? []).map(({ title, text, safe }) => ({
      title,
      edits: [{ op: 'value' as const, path, text }],
      ...(safe && { safe }),
    }));
    reader.problems.push({
      rule: problem.code === 'implausible' ? 'implausible-quantity' : 'quantity',
      path,
      on: 'value',
      message: problem.message,
      ...(problem.range && { within: problem.range }),
      fixes: fixes.length === 1 ? [{ ...fixes[0], preferred: true }] : fixes,
    });
  }
  return result[key];
}
