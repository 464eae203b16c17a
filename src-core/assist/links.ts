import type { FilePath, TextRange } from '../text/types';
import { rangeOfOccurrence } from './names';
import { type Library, occurrencesIn } from './occurrences';

export interface Link {
  readonly range: TextRange;
  readonly target: FilePath;
}

/** The paths in `use` and `touchstone` as links; none that leads out of the root. */
export function linksOf(library: Library, file: FilePath): readonly Link[] {
  return occurrencesIn(library, file).flatMap((occurrence) => {
    const { identity } = occurrence;
    const range =
      (identity.role === 'file' || identity.role === 'touchstone') && identity.file !== ''
        ? rangeOfOccurrence(library, occurrence)
        : undefined;
    return range ? [{ range, target: identity.file }] : [];
  });
}
