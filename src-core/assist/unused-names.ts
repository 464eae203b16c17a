import { fileKind } from '../inputs';
import { asList, isMapping } from '../raw';
import type { ParsedFile } from '../text/parsed';
import type { FilePath, TextEdit } from '../text/types';
import type { Completion, Surroundings } from './completions';
import type { Cursor } from './cursor';
import { relativePath } from './names';
import { usesOf } from './occurrences';

/** Stackups or parts of parts files that this file does not use yet; taking one adds the `use` entry too. */
export async function unusedNames(
  parsed: ParsedFile,
  cursor: Cursor,
  role: 'part' | 'stackup',
  { library }: Surroundings,
  kind: string | undefined,
): Promise<Completion[]> {
  if (!library) return [];
  const used = new Set(usesOf(parsed).values());
  const found: Completion[] = [];
  for (const [file, other] of await library()) {
    if (file === parsed.file || used.has(file) || fileKind(file) !== 'parts' || !isMapping(other.value)) continue;
    const names = other.value[role === 'part' ? 'parts' : 'stackups'];
    if (!isMapping(names)) continue;
    const prefix = prefixFor(parsed, file);
    for (const [name, value] of Object.entries(names).slice(0, 100)) {
      if (role === 'part' && kind && isMapping(value) && value.kind !== kind) continue;
      if (role === 'stackup' && asList(value).length === 0) continue;
      const text = `${prefix}.${name}`;
      found.push({
        label: text,
        kind: 'name',
        detail: `adds use: ${relativePath(parsed.file, file)}`,
        insert: text,
        isSnippet: false,
        range: cursor.token,
        filter: text,
        rank: 500,
        also: [useEdit(parsed, prefix, file)],
      });
    }
  }
  return found;
}

/** The file's own name as prefix, with a number where it is taken. */
function prefixFor(parsed: ParsedFile, file: FilePath): string {
  const taken = new Set(usesOf(parsed).keys());
  const base =
    (file.split('/').at(-1) ?? '')
      .replace(/\.parts\.yaml$/, '')
      .toLowerCase()
      .replace(/[^a-z0-9-]+/g, '-')
      .replace(/^[^a-z]+/, '') || 'parts';
  for (let n = 1; ; n++) {
    const prefix = n === 1 ? base : `${base}-${n}`;
    if (!taken.has(prefix)) return prefix;
  }
}

/** A line behind the last `use` entry, or a new `use` before the first key that is no heading. */
function useEdit(parsed: ParsedFile, prefix: string, file: FilePath): TextEdit {
  const { text } = parsed;
  const lineEnd = text.includes('\r\n') ? '\r\n' : '\n';
  const line = `${prefix}: ${relativePath(parsed.file, file)}`;
  const use = /^use:[ \t]*(#.*)?$/m.exec(text);
  if (use) {
    const after = text.indexOf('\n', use.index);
    const at = after === -1 ? text.length : after + 1;
    const indent = /^( +)\S/.exec(text.slice(at))?.[1] ?? '  ';
    return {
      file: parsed.file,
      range: { start: at, end: at },
      text: `${after === -1 ? lineEnd : ''}${indent}${line}${lineEnd}`,
    };
  }
  const heading = /^(path|transmitter|receiver|limits|stackups|parts|materials|foils):/m.exec(text);
  const at = heading?.index ?? text.length;
  return { file: parsed.file, range: { start: at, end: at }, text: `use:${lineEnd}  ${line}${lineEnd}${lineEnd}` };
}
