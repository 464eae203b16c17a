import { type FormatProblem, reportOf } from '../format/index';
import { nearest } from '../quantity/nearest';
import type { Fix, Report } from '../report';
import type { FilePath, Place, ValuePath } from '../text/types';

export type ModelReport = Report & { readonly rule: string; readonly subject?: string };

export const placeIn = (file: FilePath, path: ValuePath, on?: Place['on']): Place => ({
  file,
  path,
  ...(on && { on }),
});

/** Problems of the format at a mapping of a file, as reports about `subject`. */
export const formatReports = (
  problems: readonly FormatProblem[],
  file: FilePath,
  path: ValuePath,
  subject?: string,
): ModelReport[] =>
  problems.map((problem) => ({ ...reportOf(problem, { file, path }), ...(subject !== undefined && { subject }) }));

/** Text of a name in a message: short, on one line, without back-quotes of its own. */
export const quoted = (name: string) =>
  `\`${(name.length > 60 ? `${name.slice(0, 57)}…` : name).replace(/[`\n\r]/g, '\u2019')}\``;

/** Fixes that write another name in place of the value at `at`: the near one first, else at most `most` of them. */
export function nameFixes(at: Place, written: string, names: readonly string[], most = 5): readonly Fix[] {
  const near = nearest(written, names);
  const replace = (name: string): Fix => ({ title: `Change to \`${name}\``, edits: [{ op: 'value', at, text: name }] });
  if (near !== undefined) return [{ ...replace(near), preferred: true }];
  return names.slice(0, most).map(replace);
}

/** `, did you mean …?` or `; there are …` or nothing. */
export function nameHint(written: string, names: readonly string[], noun: string): string {
  const near = nearest(written, names);
  if (near !== undefined) return `; did you mean \`${near}\`?`;
  if (names.length === 0) return `: there is no ${noun} here.`;
  return `; there ${names.length === 1 ? 'is' : 'are'} ${names
    .slice(0, 8)
    .map((name) => `\`${name}\``)
    .join(', ')}${names.length > 8 ? ' and others' : ''}.`;
}
