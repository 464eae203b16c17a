import type { AnalyseOptions, Analysis } from '../analysis';
import { causesOf, MOST_GROUPS } from './causes';
import { changesOf, waiverChanges } from './changes';
import { derivedChanges } from './derived';
import { figureChanges } from './figures';
import { findingChanges } from './findings';
import { type Grouped, groupLeaves, MOST_LEAVES } from './groups';
import { compare } from './hybrid';
import { loosenedLimits, loosenedRules } from './loosened';
import { sameElectrically, sameJudgement } from './same-model';
import type { ChannelPair, ChannelReview, Side } from './types';

export interface ReviewOptions {
  /** Gives the clock of one analysis. */
  readonly outOfTime?: () => AnalyseOptions['outOfTime'];
  /** Leaves out which group of changes does what: two analyses a group. */
  readonly withoutCauses?: boolean;
}

/** What changed in one channel between two revisions, and what that did. It returns, whatever the files hold. */
export function reviewChannel(pair: ChannelPair, options: ReviewOptions = {}): ChannelReview {
  const [base, head] = [pair.base?.analysis, pair.head?.analysis];
  const common = commonOf(pair);
  const stops = whyBroken(pair.head);
  if (pair.head && stops !== undefined) {
    const before = whyBroken(pair.base) !== undefined ? ' It was not computed before either.' : '';
    return {
      ...common,
      ...findingChanges(base, head, new Map()),
      state: 'broken',
      notes: [`HEAD ${stops}.${pair.base ? before : ''}`],
    };
  }
  if (!pair.base || !pair.head || !head)
    return { ...common, ...findingChanges(base, head, new Map()), state: pair.head ? 'added' : 'removed' };
  const baseStops = whyBroken(pair.base);
  if (!base || baseStops !== undefined)
    return {
      ...common,
      ...findingChanges(undefined, head, new Map()),
      notes: [`BASE ${baseStops}; there are no figures to compare with.`],
    };
  return compared(common, base, head, pair, options);
}

/** Why a side's figures cannot be had, as the end of a sentence. */
function whyBroken(side: Side | undefined): string | undefined {
  if (!side) return undefined;
  const { analysis, missing } = side;
  if (!analysis) return missing ?? 'could not be read';
  if (analysis.timedOut) return 'met its time limit';
  return analysis.cascade ? undefined : `is ${analysis.verdict.text}`;
}

function commonOf(pair: ChannelPair): ChannelReview {
  const [base, head] = [pair.base?.analysis, pair.head?.analysis];
  const itself =
    !pair.changedFiles ||
    !pair.base ||
    !pair.head ||
    pair.renamedFrom !== undefined ||
    pair.changedFiles.includes(pair.file);
  return {
    file: pair.file,
    ...(pair.renamedFrom !== undefined && { renamedFrom: pair.renamedFrom }),
    title: (head ?? base)?.model.title ?? pair.file,
    state: 'changed',
    why: itself ? 'itself' : pair.changedFiles,
    changes: [],
    figures: [],
    appeared: [],
    gone: [],
    waivers: [],
    loosened: [],
    verdict: { ...(base && { from: base.verdict }), ...(head && { to: head.verdict }) },
    causes: [],
    notes: [],
    ...(base && { base }),
    ...(head && { head }),
  };
}

function compared(
  common: ChannelReview,
  base: Analysis,
  head: Analysis,
  pair: ChannelPair,
  options: ReviewOptions,
): ChannelReview {
  const comparison = compare(base, head);
  const figures = figureChanges(base.figures, head.figures);
  // the figures have the last word: what they show as different is never called without effect
  const sameFigures = figures.length === 0 && sameElectrically(base, head);
  const grouped = groupLeaves(comparison, base, head);
  const written = changesOf(comparison.leaves, sameFigures ? withoutGroups(grouped) : grouped);
  const derived = sameFigures ? [] : derivedChanges(base, head, comparison.nameInHead);
  const loosened = [...loosenedRules(base, head), ...loosenedLimits(written, base, head)];
  const found = findingChanges(base, head, comparison.nameInHead);
  const nothing =
    sameFigures &&
    sameJudgement(base, head) &&
    loosened.length === 0 &&
    found.appeared.length + found.gone.length === 0 &&
    base.verdict.state === head.verdict.state;
  const fall = smallestMargin(base) - smallestMargin(head);
  const causes =
    sameFigures || options.withoutCauses
      ? { causes: [] }
      : causesOf(comparison, grouped, written, [base, head], options.outOfTime ?? (() => undefined));
  return {
    ...common,
    state: nothing ? 'no-effect' : 'changed',
    changes: [...written, ...derived],
    figures,
    ...found,
    waivers: waiverChanges(written),
    loosened,
    ...causes,
    ...(Number.isFinite(fall) && { smallestMarginFall: sameFigures && nothing ? 0 : fall }),
    notes: notesOf(pair, written.length, nothing, grouped.count, comparison.leaves.length),
  };
}

/** The least that is in hand of any limit, as its share; infinite where nothing is limited. */
const smallestMargin = ({ limits }: Analysis) =>
  limits.reduce((least, { marginShare }) => Math.min(least, marginShare), Number.POSITIVE_INFINITY);

const withoutGroups = (grouped: Grouped): Grouped => ({ ...grouped, groupOf: new Map(), count: 0 });

function notesOf(pair: ChannelPair, changes: number, nothing: boolean, groups: number, leaves: number): string[] {
  return [
    ...(pair.renamedFrom !== undefined ? [`The file was \`${pair.renamedFrom}\`.`] : []),
    ...(nothing && changes === 0 && pair.renamedFrom === undefined
      ? ['Only comments, order or spelling changed: nothing that is computed.']
      : nothing
        ? ['No electrical effect.']
        : []),
    ...(leaves > MOST_LEAVES ? [`More than ${MOST_LEAVES} values changed: they are not told apart.`] : []),
    ...(groups > MOST_GROUPS ? [`More than ${MOST_GROUPS} independent changes: what each does is not told.`] : []),
  ];
}
