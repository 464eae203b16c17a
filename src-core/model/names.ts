import { isMapping, mappingAt } from '../raw';
import type { FilePath, Place } from '../text/types';
import { type ModelReport, nameFixes, nameHint, placeIn, quoted } from './reports';
import type { Source, Sources } from './sources';

export type Shared = 'parts' | 'stackups' | 'materials' | 'foils';

const NOUNS: Readonly<Record<Shared, string>> = {
  parts: 'part',
  stackups: 'stackup',
  materials: 'material',
  foils: 'foil',
};

export type Found =
  | { readonly file: FilePath; readonly name: string; readonly broken?: undefined }
  /** Not found; `broken` also where a report elsewhere already says why. */
  | { readonly file?: undefined; readonly name?: undefined; readonly broken: true };

const NOT_FOUND: Found = { broken: true };

const holds = (source: Source | undefined, role: Shared, name: string) =>
  source !== undefined && !source.newer && Object.hasOwn(mappingAt(source.raw, role), name);

/**
 * Looks a name up as written in a file: in the file itself first, then in the files that it uses, with their prefix or, while only
 * one has it, without. An unknown or ambiguous name is a report, unless a file that could not be read may hold it.
 * @param kind of the element that names a part: of others none is offered while one of its kind is at hand
 */
export function lookUp(
  sources: Sources,
  file: FilePath,
  role: Shared,
  written: string,
  at: Place,
  reports: ModelReport[],
  subject?: string,
  kind?: string,
): Found {
  const source = sources.all.get(file);
  if (!source) return NOT_FOUND;
  if (holds(source, role, written)) return { file, name: written };
  const dot = written.indexOf('.');
  if (dot > 0 && source.uses.has(written.slice(0, dot))) {
    const used = source.uses.get(written.slice(0, dot));
    const name = written.slice(dot + 1);
    if (used === undefined || sources.all.get(used)?.newer) return NOT_FOUND;
    if (holds(sources.all.get(used), role, name)) return { file: used, name };
  } else {
    const matches = [...source.uses].filter(
      ([, used]) => used !== undefined && holds(sources.all.get(used), role, written),
    );
    const files = new Set(matches.map(([, used]) => used!));
    if (files.size === 1) return { file: [...files][0], name: written };
    if (files.size > 1) {
      reports.push(ambiguous(matches as [string, FilePath][], role, written, at, subject));
      return NOT_FOUND;
    }
    if ([...source.uses.values()].some((used) => used === undefined || sources.all.get(used)?.newer)) return NOT_FOUND;
  }
  const names = writableNames(sources, source, role, kind);
  reports.push({
    rule: 'unknown-name',
    at,
    message: `There is no ${NOUNS[role]} ${quoted(written)}${nameHint(written, names, NOUNS[role])}`,
    fixes: nameFixes(at, written, names),
    ...(subject !== undefined && { subject }),
  });
  return NOT_FOUND;
}

function ambiguous(
  matches: readonly [string, FilePath][],
  role: Shared,
  written: string,
  at: Place,
  subject?: string,
): ModelReport {
  const names = matches.map(([prefix]) => `${prefix}.${written}`);
  return {
    rule: 'ambiguous-name',
    at,
    message: `The ${NOUNS[role]} ${quoted(written)} stands in more than one file: write ${names.map((name) => `\`${name}\``).join(' or ')}.`,
    related: matches.map(([prefix, used]) => ({
      at: placeIn(used, [role, written], 'key'),
      message: `\`${prefix}.${written}\` stands here.`,
    })),
    fixes: names.map((name) => ({ title: `Write \`${name}\``, edits: [{ op: 'value', at, text: name }] })),
    ...(subject !== undefined && { subject }),
  };
}

export interface WritableName {
  readonly file: FilePath;
  readonly name: string;
  readonly writtenAs: readonly string[];
}

/** What a file may name, each with all its spellings. */
export function namesAtHand(sources: Sources, source: Source, role: Shared): readonly WritableName[] {
  const counts = new Map<string, Set<FilePath>>();
  const reachable: { file: FilePath; prefix?: string; name: string }[] = [];
  const visit = (file: FilePath, prefix?: string) => {
    const found = sources.all.get(file);
    if (!found || found.newer) return;
    for (const name of Object.keys(mappingAt(found.raw, role))) {
      reachable.push({ file, prefix, name });
      const files = counts.get(name) ?? new Set<FilePath>();
      counts.set(name, files.add(prefix === undefined ? '' : file));
    }
  };
  visit(source.file);
  for (const [prefix, used] of source.uses) if (used !== undefined && used !== source.file) visit(used, prefix);
  return reachable.map(({ file, prefix, name }) => {
    if (prefix === undefined) return { file, name, writtenAs: [name] };
    return {
      file,
      name,
      writtenAs: counts.get(name)!.size === 1 ? [`${prefix}.${name}`, name] : [`${prefix}.${name}`],
    };
  });
}

function writableNames(sources: Sources, source: Source, role: Shared, kind?: string): readonly string[] {
  const names = namesAtHand(sources, source, role);
  const isFitting = ({ file, name }: WritableName) => {
    const part = mappingAt(sources.all.get(file)?.raw, role)[name];
    return isMapping(part) && part.kind === kind;
  };
  const fitting = kind === undefined ? [] : names.filter(isFitting);
  return (fitting.length > 0 ? fitting : names).map(({ writtenAs }) => writtenAs[0]);
}
