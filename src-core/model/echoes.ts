import type { ParsedFile } from '../text/parsed';
import type { FilePath, Place, ValuePath } from '../text/types';
import type { ModelReport } from './reports';

/**
 * Leaves out what only repeats a fault of the text: reports at a place, or below it, that the reader of the text has already
 * named; and a report that is there already.
 */
export function withoutEchoes(
  reports: readonly ModelReport[],
  parsed: ReadonlyMap<FilePath, ParsedFile>,
): readonly ModelReport[] {
  const faults = new Map<FilePath, ValuePath[]>();
  for (const { file, value, reports: found } of parsed.values()) {
    // a text that is too large was not read at all: nothing else is said of it
    const unread = value === null && found.some(({ rule }) => rule === 'limit');
    const paths: ValuePath[] = found
      .filter(({ rule, at }) => rule === 'yaml' && at.path.length > 0)
      .map(({ at }) => at.path);
    if (unread) paths.push([]);
    if (paths.length > 0) faults.set(file, paths);
  }
  const said = new Set<string>();
  return reports.filter(({ rule, at, message }) => {
    if ((faults.get(at.file) ?? []).some((path) => isAt(path, at))) return false;
    const key = JSON.stringify([rule, at, message]);
    if (said.has(key)) return false;
    said.add(key);
    return true;
  });
}

const isAt = (fault: ValuePath, { path }: Place) =>
  fault.length <= path.length && fault.every((step, i) => step === path[i]);
