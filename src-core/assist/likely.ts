import type { Analysis } from '../analysis';
import type { Stackup } from '../model/types';
import type { Cursor } from './cursor';

/** The stackup that the entry under the cursor names, or the only one there is. */
export function stackupAt(analysis: Analysis, { levels, path }: Cursor): Stackup | undefined {
  const { names, elements } = analysis.model;
  const entry = levels.find((level) => level.path.length === 2 && typeof level.path[1] === 'number');
  const written = levels.findLast(({ keys }) => keys.has('stackup'))?.keys.get('stackup');
  if (written)
    return names.stackups.find(({ writtenAs }) => writtenAs.includes(written.replace(/^(['"])(.*)\1$/, '$2')))?.stackup;
  const element = entry && path[0] === 'path' ? elements.find(({ index }) => index === entry.path[1]) : undefined;
  return element?.stackup ?? (names.stackups.length === 1 ? names.stackups[0].stackup : undefined);
}

/** The layer that the neighbours suggest: where the last via ended, where the next trace runs. */
export function likelyLayer(
  analysis: Analysis,
  cursor: Cursor,
  stackup: Stackup | undefined,
  key: string,
): string | undefined {
  const { elements } = analysis.model;
  const at = cursor.path[0] === 'path' && typeof cursor.path[1] === 'number' ? cursor.path[1] : undefined;
  if (at === undefined) return undefined;
  const isFitting = (element: (typeof elements)[number]) => !stackup || element.stackup?.name === stackup.name;
  const before = elements.findLast(
    (element) => element.index < at && isFitting(element) && (element.layer ?? element.to) !== undefined,
  );
  const after = elements.find(
    (element) => element.index > at && isFitting(element) && (element.layer ?? element.from) !== undefined,
  );
  if (key === 'to') return after?.layer ?? after?.from;
  const reached = before?.kind === 'via' ? before.to : before?.layer;
  return reached ?? after?.layer ?? after?.from;
}
