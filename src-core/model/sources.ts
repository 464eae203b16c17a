import type { Inputs } from '../analysis';
import { readValues } from '../format/index';
import { fileKind, joinPath } from '../inputs';
import { isMapping, mappingAt, type RawMapping } from '../raw';
import type { ParsedFile } from '../text/parsed';
import type { FilePath } from '../text/types';
import { formatReports, type ModelReport, placeIn, quoted } from './reports';

/** A channel or parts file, and which files its `use` names. */
export interface Source {
  readonly file: FilePath;
  readonly parsed: ParsedFile;
  readonly raw: RawMapping;
  /** By the name that the file gives them; a file that could not be read is undefined. */
  readonly uses: ReadonlyMap<string, FilePath | undefined>;
  /** Written in a newer version: nothing in it is read. */
  readonly newer: boolean;
}

/** All files that take part, the analysed one first. */
export interface Sources {
  readonly own: Source;
  readonly all: ReadonlyMap<FilePath, Source>;
  readonly inputs: Inputs;
  readonly reports: readonly ModelReport[];
}

/** Follows `use` from the analysed file; a file that cannot be read, a path that is refused and a cycle are each a report. */
export function gatherSources(inputs: Inputs, parsed: ReadonlyMap<FilePath, ParsedFile>): Sources {
  const reports: ModelReport[] = [];
  const all = new Map<FilePath, Source>();
  const waiting = [inputs.file];
  for (let at = 0; at < waiting.length; at++) {
    const file = waiting[at];
    const text = parsed.get(file);
    if (!text) continue;
    const raw = isMapping(text.value) ? text.value : {};
    const uses = new Map<string, FilePath | undefined>();
    for (const [name, path] of Object.entries(mappingAt(raw, 'use'))) {
      const used = followUse(inputs, parsed, file, name, path, reports);
      uses.set(name, used);
      if (used !== undefined && !waiting.includes(used)) waiting.push(used);
    }
    all.set(file, { file, parsed: text, raw, uses, newer: isNewer(raw) });
  }
  reports.push(...cycleReports(all));
  const own = all.get(inputs.file)!;
  return { own, all, inputs, reports };
}

const isNewer = (raw: RawMapping) =>
  typeof raw.lanewright === 'number' && Number.isInteger(raw.lanewright) && raw.lanewright > 1;

function followUse(
  inputs: Inputs,
  parsed: ReadonlyMap<FilePath, ParsedFile>,
  file: FilePath,
  name: string,
  path: unknown,
  reports: ModelReport[],
): FilePath | undefined {
  if (typeof path !== 'string') return undefined; // the schema says so
  const at = placeIn(file, ['use', name]);
  const refuse = (rule: string, message: string) => {
    reports.push({ rule, at, message });
    return undefined;
  };
  const joined = joinPath(file, path);
  if (joined.problem !== undefined) return refuse('refused-file', `The path ${quoted(path)} ${joined.problem}.`);
  if (fileKind(joined.file) !== 'parts')
    return refuse('refused-file', `${quoted(path)} is no parts file: its name ends with \`.parts.yaml\`.`);
  if (parsed.has(joined.file)) return joined.file;
  return refuse(...unreadable(inputs, joined.file, path));
}

/** Why a file of the inputs has no text, as a rule's name and a message. */
export function unreadable({ files }: Inputs, file: FilePath, written: string): [string, string] {
  const content = files.get(file);
  if (content?.kind === 'refused') return ['refused-file', `${quoted(written)} is not read: ${content.reason}.`];
  if (content?.kind === 'too-large')
    return ['limit', `${quoted(written)} is not read: it is larger than ${Math.round(content.limit / 1048576)} MiB.`];
  return ['missing-file', `There is no file ${quoted(written)}; paths are relative to the file that names them.`];
}

/** A report at each `use` that is part of a cycle, with the others as related places. */
function cycleReports(all: ReadonlyMap<FilePath, Source>): ModelReport[] {
  const edges: { from: FilePath; name: string; to: FilePath }[] = [];
  for (const source of all.values())
    for (const [name, to] of source.uses) if (to !== undefined) edges.push({ from: source.file, name, to });
  const reaches = (from: FilePath, wanted: FilePath): boolean => {
    const seen = new Set<FilePath>();
    const waiting = [from];
    for (let file = waiting.pop(); file !== undefined; file = waiting.pop()) {
      if (file === wanted) return true;
      if (seen.has(file)) continue;
      seen.add(file);
      for (const to of all.get(file)?.uses.values() ?? []) if (to !== undefined) waiting.push(to);
    }
    return false;
  };
  const inCycle = edges.filter(({ from, to }) => reaches(to, from));
  return inCycle.map((edge) => {
    const others = inCycle.filter(
      (other) => other !== edge && reaches(edge.to, other.from) && reaches(other.to, edge.from),
    );
    return {
      rule: 'use-cycle',
      at: placeIn(edge.from, ['use', edge.name], 'entry'),
      message:
        edge.from === edge.to
          ? 'This file uses itself. Remove the line.'
          : `\`${edge.name}\` leads back to this file: parts files that use each other are a cycle. Move what both need to a third file.`,
      related: others.map((other) => ({
        at: placeIn(other.from, ['use', other.name], 'entry'),
        message: `\`${other.name}\` closes the cycle.`,
      })),
    };
  });
}

/** What the schema says of a parts file's own keys; its materials, foils and drill rules as read. */
export function readPartsFile(source: Source): {
  values: ReturnType<typeof readValues<'parts'>>['values'];
  reports: readonly ModelReport[];
} {
  const { values, problems } = readValues('parts', source.parsed.value);
  const shown = source.newer ? problems.filter(({ rule }) => rule === 'format-version') : problems;
  return { values: source.newer ? {} : values, reports: formatReports(shown, source.file, []) };
}
