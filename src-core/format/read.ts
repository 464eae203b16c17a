import type { NodeSchema, QuantitySpec, SchemaName, ValuesOf } from '../../schemas/format/types';
import { FORMAT_VERSION } from '../../schemas/format/version';
import { schemas } from '../../schemas/generated/format';
import type { QuantityProblem } from '../quantity/problem';
import { readQuantity } from '../quantity/read';
import { readBand } from '../quantity/read-band';
import { isMapping } from '../raw';
import type { ValuePath } from '../text/types';
import { childOf, mappingOf } from './node-at';
import type { FormatProblem } from './problem';
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
): { values: Partial<ValuesOf<Name>>; problems: readonly FormatProblem[] } {
  if (!isMapping(raw)) return readAnew(name, raw, options);
  const kept = known.get(raw);
  const read =
    kept?.name === name && kept.nyquistHz === options.nyquistHz
      ? kept
      : { name, nyquistHz: options.nyquistHz, ...readAnew(name, raw, options) };
  if (read !== kept) known.set(raw, read);
  // A copy of one's own: callers add to it what a part says.
  return { values: Object.assign(Object.create(null), read.values), problems: read.problems };
}

interface Known {
  readonly name: SchemaName;
  readonly nyquistHz: number | undefined;
  readonly values: unknown;
  readonly problems: readonly FormatProblem[];
}

/** What was read of a mapping, as long as that lives: an edit leaves the mappings of other entries the same objects. */
const known = new WeakMap<object, Known>();

function readAnew<Name extends SchemaName>(name: Name, raw: unknown, options: ReadOptions) {
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

const isBad = ({ bad }: Reader, path: ValuePath) => bad.size > 0 && path.length > 0 && bad.has(JSON.stringify(path));

/** The value as read; undefined where it is bad. */
function readNode(reader: Reader, node: NodeSchema, raw: unknown, path: ValuePath): unknown {
  if (raw === null || raw === undefined || isBad(reader, path)) return undefined;
  const spec = node['x-quantity'];
  if (spec?.band) return noted(reader, path, readBand(String(raw), spec), 'band');
  if (spec?.list) return readQuantities(reader, spec, raw, path);
  if (spec) return readOne(reader, spec, raw, path);
  if (node.anyOf) return readNode(reader, node.anyOf.find((branch) => fits(branch, raw)) ?? {}, raw, path);
  if (isMapping(raw)) return node.properties || node.patternProperties ? readMapping(reader, node, raw, path) : raw;
  if (Array.isArray(raw))
    return node.items ? whole(raw.map((item, index) => readNode(reader, node.items!, item, [...path, index]))) : raw;
  return Array.isArray(node.type) && node.type.includes('string') ? String(raw) : raw;
}

/** A list is read whole or not at all: a point that is left out would change a curve. */
const whole = (read: unknown[]) => (read.includes(undefined) ? undefined : read);

function readQuantities(reader: Reader, spec: QuantitySpec, raw: unknown, path: ValuePath) {
  if (!Array.isArray(raw)) return whole([readOne(reader, spec, raw, path)]);
  const entry = { ...spec, list: false };
  return whole(raw.map((item, index) => readOne(reader, entry, item, [...path, index])));
}

const fits = (branch: NodeSchema, raw: unknown) =>
  isMapping(raw)
    ? branch.properties !== undefined
    : branch.properties === undefined && (branch.const === undefined || branch.const === raw);

/** An inner mapping that lacks what its schema demands is left out as a whole. */
function readMapping(reader: Reader, node: NodeSchema, raw: Record<string, unknown>, path: ValuePath) {
  const values: Record<string, unknown> = Object.create(null);
  for (const [key, value] of Object.entries(raw)) {
    const child = key.startsWith('x-') ? undefined : childOf(node, key);
    const read = child && readNode(reader, child, value, [...path, key]);
    if (read !== undefined) values[key] = read;
  }
  const isWhole = path.length === 0 || (mappingOf(node)?.required ?? []).every((key) => Object.hasOwn(values, key));
  return isWhole ? values : undefined;
}

function readOne(reader: Reader, spec: QuantitySpec, raw: unknown, path: ValuePath) {
  if (isBad(reader, path) || (typeof raw !== 'string' && typeof raw !== 'number')) return undefined;
  return noted(reader, path, readQuantity(raw, spec, reader.options), 'quantity');
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
