import type { Analysis } from '../analysis';
import { rangeOf } from '../text/index';
import type { TextRange } from '../text/types';

export interface Lens {
  readonly range: TextRange;
  /** What the verdict says, with `~` where the eye is of an older text. */
  readonly title: string;
}

/** One lens, on `path:`, with the verdict; it stays on its line while one types elsewhere. */
export function lensesOf(analysis: Analysis): readonly Lens[] {
  const { file } = analysis.model;
  const parsed = analysis.parsed.get(file);
  if (parsed?.kind !== 'channel' || !hasPath(parsed.value)) return [];
  const range = rangeOf(parsed, { file, path: ['path'], on: 'key' });
  return [{ range, title: `${analysis.linkIsStale ? '~ ' : ''}${analysis.verdict.text}` }];
}

const hasPath = (value: unknown) => typeof value === 'object' && value !== null && Object.hasOwn(value, 'path');
