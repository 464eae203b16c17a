import { analyse } from '../analyse';
import type { Analysis } from '../analysis';
import type { Decide, Leaf } from './blend';
import type { Comparison } from './hybrid';
import { sameElectrically } from './same-model';

/** More differences than this are not taken apart one by one. */
export const MOST_LEAVES = 100;

export interface Grouped {
  /** Of each leaf by its id: its group from 1, or 0 where it computes the same. */
  readonly groupOf: ReadonlyMap<string, number>;
  /** Leaves that this channel does not read, such as another stackup of the same parts file. */
  readonly foreign: ReadonlySet<string>;
  readonly count: number;
}

const isError = (analysis: Analysis) =>
  analysis.findings.filter(({ severity, waivedBy }) => severity === 'error' && !waivedBy);
const errorsOf = (analysis: Analysis) =>
  new Set(isError(analysis).map(({ rule, subject }) => `${rule}\n${subject ?? ''}`));

/** A state with an error that neither side has is none that anyone wanted. */
export function isValid(state: Analysis, base: Analysis, head: Analysis): boolean {
  const known = new Set([...errorsOf(base), ...errorsOf(head)]);
  const incomplete = (analysis: Analysis) => analysis.model.elements.some((element) => element.incomplete);
  if (incomplete(state) && !incomplete(base) && !incomplete(head)) return false;
  return [...errorsOf(state)].every((error) => known.has(error));
}

const modelOf = (comparison: Comparison, base: Analysis, decide: Decide) =>
  analyse(comparison.inputs(decide), base, { until: 'model' });

/**
 * Sorts the differences into groups that can be had one at a time. Each that is valid by itself is one; those that are not (the two
 * ends of a layer swap) are one together. Only the model is read for that: no network is computed.
 */
export function groupLeaves(comparison: Comparison, base: Analysis, head: Analysis): Grouped {
  const { leaves } = comparison;
  const groupOf = new Map<string, number>();
  const foreign = new Set<string>();
  const own = (leaf: Leaf) => leaf.file === head.inputs.file;
  const changing: Leaf[] = [];
  const invalid: Leaf[] = [];
  for (const leaf of leaves) {
    groupOf.set(leaf.id, 0);
    // renames are head's in every state
    if (leaf.what === 'renamed' && own(leaf)) continue;
    if (leaves.length > MOST_LEAVES) {
      invalid.push(leaf);
      continue;
    }
    const alone = modelOf(comparison, base, ({ id }) => id === leaf.id);
    if (!isValid(alone, base, head)) invalid.push(leaf);
    else if (!sameElectrically(alone, base)) changing.push(leaf);
    else if (!own(leaf) && sameElectrically(alone, base, { spelling: true })) foreign.add(leaf.id);
  }
  const together = new Set(invalid.map(({ id }) => id));
  const groups: Set<string>[] = changing.map(({ id }) => new Set([id]));
  if (together.size > 0) {
    const state = modelOf(comparison, base, ({ id }) => together.has(id));
    // what is valid only with changes that are valid alone cannot be told apart from them
    if (!isValid(state, base, head))
      groups.splice(0, groups.length, new Set([...together, ...changing.map(({ id }) => id)]));
    else if (!sameElectrically(state, base)) groups.push(together);
  }
  const order = (group: Set<string>) => leaves.findIndex(({ id }) => group.has(id));
  groups.sort((a, b) => order(a) - order(b));
  groups.forEach((group, i) => {
    for (const id of group) groupOf.set(id, i + 1);
  });
  return { groupOf, foreign, count: groups.length };
}
