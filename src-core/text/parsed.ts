import type { Report } from '../report';
import type { FileKind, FilePath } from './types';

/** A YAML file as read: plain values (null-prototype objects) beside what is needed to look up ranges. */
export interface ParsedFile {
  readonly file: FilePath;
  readonly kind: FileKind;
  readonly text: string;
  readonly value: unknown;
  /** What the reader of the text found: syntax, tabs, duplicate keys, limits. */
  readonly reports: readonly (Report & { readonly rule: string })[];
  /** Opaque to other folders; `rangeOf`, `resolveEdits` in this folder read it. */
  readonly syntax: unknown;
}
