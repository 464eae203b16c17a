import type { Leaf } from './blend';
import type { Grouped } from './groups';
import { written } from './subject';
import type { Change } from './types';

const text = (value: unknown) => (value === undefined ? undefined : written(value));

function words(leaf: Leaf, from: string | undefined, to: string | undefined): string {
  const { subject, attribute, what } = leaf;
  const whole = leaf.path.length <= 2 && attribute === what;
  switch (what) {
    case 'added':
      return whole ? `${subject} added: ${to}` : `${subject}: ${attribute} ${to}, was not written`;
    case 'removed':
      return whole ? `${subject} removed: ${from}` : `${subject}: ${attribute} ${from} removed`;
    case 'moved':
      return `${subject} moved from place ${from} to ${to}`;
    case 'renamed':
      return `${from} renamed to ${to}`;
    case 'content':
      return `${subject}: its data changed`;
    default:
      return `${subject}: ${attribute} ${from} → ${to}`;
  }
}

/** The differences of the texts in words, in the order of the text. What the channel does not read is left out. */
export function changesOf(leaves: readonly Leaf[], { groupOf, foreign }: Grouped): readonly Change[] {
  return leaves
    .filter(({ id }) => !foreign.has(id))
    .map((leaf): Change => {
      const [from, to] = [text(leaf.from), text(leaf.to)];
      const group = groupOf.get(leaf.id) ?? 0;
      return {
        subject: leaf.subject,
        attribute: leaf.attribute,
        ...(from !== undefined && { from }),
        ...(to !== undefined && { to }),
        electrical: group > 0,
        words: words(leaf, from, to),
        // of what is gone the place that held it
        at: { file: leaf.file, path: leaf.what === 'removed' ? leaf.path.slice(0, -1) : leaf.path },
        group,
      };
    });
}

const ofWaiver = ({ at: { path } }: Change) => path[0] === 'waivers';

/** Waivers that came, went or changed. */
export const waiverChanges = (changes: readonly Change[]) => changes.filter(ofWaiver);
