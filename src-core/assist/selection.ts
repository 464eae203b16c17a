import { rangeOf } from '../text/index';
import type { ParsedFile } from '../text/parsed';
import type { TextRange } from '../text/types';
import { subjectAt } from './subject';

/** Ranges around an offset, each inside the next: value, pair, element, its list, the file. */
export function selectionAt(parsed: ParsedFile, offset: number): readonly TextRange[] {
  const { file, text } = parsed;
  const subject = subjectAt(parsed, offset);
  const wanted: TextRange[] = [];
  if (subject) wanted.push(subject.range);
  for (let depth = subject?.path.length ?? 0; depth > 0; depth--)
    wanted.push(rangeOf(parsed, { file, path: subject!.path.slice(0, depth), on: 'entry' }));
  wanted.push({ start: 0, end: text.length });
  const ranges: TextRange[] = [];
  for (const range of wanted) {
    const inner = ranges.at(-1);
    const holds = range.start <= offset && offset <= range.end;
    if (!holds || (inner && (range.start > inner.start || range.end < inner.end))) continue;
    if (!inner || range.start < inner.start || range.end > inner.end) ranges.push(range);
  }
  return ranges;
}
