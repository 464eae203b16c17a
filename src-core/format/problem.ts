import type { Report } from '../report';
import type { FilePath, Place, PlaceEdit, TextRange, ValuePath } from '../text/types';

export type FormatRule = 'schema' | 'quantity' | 'implausible-quantity' | 'reserved-key' | 'format-version';

/** A `PlaceEdit` whose path is relative to the mapping that was read. */
export type RelativeEdit =
  | {
      readonly op: 'set';
      readonly path: ValuePath;
      readonly key: string;
      readonly text: string;
      readonly after?: string;
      readonly first?: boolean;
    }
  | { readonly op: 'first'; readonly path: ValuePath }
  | { readonly op: 'value'; readonly path: ValuePath; readonly text: string }
  | { readonly op: 'key'; readonly path: ValuePath; readonly name: string }
  | { readonly op: 'remove'; readonly path: ValuePath };

export interface FormatFix {
  readonly title: string;
  readonly edits: readonly RelativeEdit[];
  readonly preferred?: boolean;
  /** Only spelling: nothing that a valid file says changes. */
  readonly safe?: boolean;
}

/** One thing wrong with a mapping, at a path relative to it. */
export interface FormatProblem {
  readonly rule: FormatRule;
  readonly path: ValuePath;
  readonly on: 'key' | 'value' | 'entry';
  readonly message: string;
  /** The part of the value's text that it is about, where that is less than all of it. */
  readonly within?: TextRange;
  readonly fixes: readonly FormatFix[];
  /** The key that is missing, where that is the problem. */
  readonly lacks?: string;
}

/** The problem as a report: paths from the document's root. */
export function reportOf(
  problem: FormatProblem,
  base: { file: FilePath; path: ValuePath },
): Report & { rule: FormatRule } {
  const { rule, message, on } = problem;
  const at = (path: ValuePath): Place => ({ file: base.file, path: [...base.path, ...path] });
  const absolute = ({ path, ...edit }: RelativeEdit): PlaceEdit => ({ ...edit, at: at(path) }) as PlaceEdit;
  const fixes = problem.fixes.map(({ edits, ...fix }) => ({ ...fix, edits: edits.map(absolute) }));
  return { rule, message, at: { ...at(problem.path), on }, ...(fixes.length > 0 && { fixes }) };
}
