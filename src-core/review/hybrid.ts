import type { Analysis, Inputs } from '../analysis';
import { fileKind, joinPath } from '../inputs';
import { isMapping, listAt, mappingAt, type RawMapping } from '../raw';
import type { FileContent, FilePath } from '../text/types';
import { blend, type Decide, type Leaf } from './blend';
import { entryOf, matchEntries, withNames } from './match';

/** A file of ours on both sides. */
interface FilePair {
  readonly base: FilePath;
  readonly head: FilePath;
}

/** Two analysed states of a channel and what lies between them. */
export interface Comparison {
  /** Every difference of the texts' values, renames of elements and limits first; the same one never twice. */
  readonly leaves: readonly Leaf[];
  /** Names of elements and limits in base, by those of head. */
  readonly nameInHead: ReadonlyMap<string, string>;
  /** The inputs of the state that takes from head what `decide` says and the rest from base, under head's names. */
  inputs(decide: Decide): Inputs;
}

/** @param base and head as analysed, both readable */
export function compare(base: Analysis, head: Analysis): Comparison {
  const pairs = pairFiles(base, head);
  const baseValue = (file: FilePath) => base.parsed.get(file)?.value;
  const headValue = (file: FilePath) => head.parsed.get(file)?.value;
  const own = pairs[0];
  const names = namesOf(baseValue(own.base), headValue(own.head));
  const prepared = pairs.map((pair) => {
    const moved = withPaths(baseValue(pair.base), pair, pairs);
    const value = pair === own && isMapping(moved) ? withNames(moved, names.elements, names.limits) : moved;
    return { pair, base: value, head: headValue(pair.head) };
  });
  const contents = [...head.inputs.files].filter(
    ([file, content]) => fileKind(file) === 'touchstone' && differs(base.inputs.files.get(file), content),
  );
  const dataLeaf = (file: FilePath): Leaf => ({
    id: `${file}\ncontent`,
    file,
    path: [],
    what: 'content',
    subject: file,
    attribute: 'data',
  });

  const leaves: Leaf[] = [...names.leaves(own.head)];
  const collect: Decide = (leaf) => {
    leaves.push(leaf);
    return true;
  };
  for (const one of prepared) blend(one.base, one.head, one.pair.head, collect);
  for (const [file] of contents) collect(dataLeaf(file));

  return {
    leaves,
    nameInHead: new Map([...names.elements, ...names.limits]),
    inputs(decide) {
      const files = new Map<FilePath, FileContent>([...base.inputs.files, ...head.inputs.files]);
      for (const one of prepared) {
        const value = blend(one.base, one.head, one.pair.head, decide);
        files.set(one.pair.head, { kind: 'text', text: JSON.stringify(value) });
      }
      for (const [file] of contents) if (!decide(dataLeaf(file))) files.set(file, base.inputs.files.get(file)!);
      return { ...head.inputs, files };
    },
  };
}

const textOf = (content: FileContent | undefined) => (content?.kind === 'text' ? content.text : undefined);
const differs = (a: FileContent | undefined, b: FileContent) =>
  a !== undefined && (a.kind !== b.kind || textOf(a) !== textOf(b));

/** The channel, then the parts files that both sides use: under one path, or under one name of `use`. */
function pairFiles(base: Analysis, head: Analysis): readonly FilePair[] {
  const pairs: FilePair[] = [{ base: base.inputs.file, head: head.inputs.file }];
  const known = (pair: FilePair) => pairs.some((one) => one.base === pair.base || one.head === pair.head);
  const add = (pair: FilePair) => {
    if (base.parsed.has(pair.base) && head.parsed.has(pair.head) && !known(pair)) pairs.push(pair);
  };
  const parts = (file: FilePath) => fileKind(file) === 'parts';
  for (const file of head.parsed.keys()) if (parts(file)) add({ base: file, head: file });
  for (let at = 0; at < pairs.length; at++) {
    const before = mappingAt(base.parsed.get(pairs[at].base)?.value, 'use');
    for (const [name, path] of Object.entries(mappingAt(head.parsed.get(pairs[at].head)?.value, 'use'))) {
      const from = Object.hasOwn(before, name) ? target(pairs[at].base, before[name]) : undefined;
      const to = target(pairs[at].head, path);
      if (from !== undefined && to !== undefined) add({ base: from, head: to });
    }
  }
  return pairs;
}

const target = (file: FilePath, path: unknown) => (typeof path === 'string' ? joinPath(file, path).file : undefined);

/** Base's text as it would stand in head's file: paths that mean a file which head knows by another path are head's. */
function withPaths(value: unknown, pair: FilePair, pairs: readonly FilePair[]): unknown {
  if (!isMapping(value)) return value;
  const rewritten = (path: unknown): unknown => {
    const file = target(pair.base, path);
    if (file === undefined) return path;
    const now = pairs.find((one) => one.base === file)?.head ?? file;
    return target(pair.head, path) === now ? path : relativePath(pair.head, now);
  };
  const inEntry = (entry: unknown) =>
    isMapping(entry) && 'touchstone' in entry ? { ...entry, touchstone: rewritten(entry.touchstone) } : entry;
  const each = (of: RawMapping, change: (inner: unknown) => unknown) =>
    Object.fromEntries(Object.entries(of).map(([key, inner]) => [key, change(inner)]));
  return {
    ...value,
    ...(isMapping(value.use) && { use: each(value.use, rewritten) }),
    ...(Array.isArray(value.path) && { path: value.path.map(inEntry) }),
    ...(isMapping(value.parts) && { parts: each(value.parts, inEntry) }),
  };
}

/** How `file` is written in a file that stands at `from`. */
function relativePath(from: FilePath, file: FilePath): string {
  const folders = from.split('/').slice(0, -1);
  const steps = file.split('/');
  let shared = 0;
  while (shared < folders.length && shared < steps.length - 1 && folders[shared] === steps[shared]) shared++;
  return [...folders.slice(shared).map(() => '..'), ...steps.slice(shared)].join('/');
}

/** Elements and limits that are the same under another name. */
function namesOf(base: unknown, head: unknown) {
  const renamed = (list: 'path' | 'limits') => {
    const [before, after] = [base, head].map((value) => listAt(value, list).map((entry) => entryOf(entry)));
    return matchEntries(before, after).flatMap((b, h) => {
      const [from, to] = [b === undefined ? undefined : before[b].name, after[h].name];
      return from !== undefined && to !== undefined && from !== to ? [{ from, to, h, list }] : [];
    });
  };
  const [elements, limits] = [renamed('path'), renamed('limits')];
  return {
    elements: new Map(elements.map(({ from, to }) => [from, to])),
    limits: new Map(limits.map(({ from, to }) => [from, to])),
    leaves: (file: FilePath): Leaf[] =>
      [...elements, ...limits].map(({ from, to, h, list }) => ({
        id: `${file}\nrenamed\n${list} ${h}`,
        file,
        path: [list, h],
        what: 'renamed',
        subject: to,
        attribute: 'name',
        from,
        to,
      })),
  };
}
