import type { Analysis } from '../analysis';
import { figureNamed } from '../figures/index';
import type { Limit } from '../model/types';
import { show } from '../quantity/show';
import type { ChannelReview, Policy, Thresholds } from './types';

/** Defaults of ours, not a standard's. */
export const defaultThresholds: Thresholds = { lossReserveDb: 0.2, eyeHeightShare: 0.05 };

/** Why a channel's review fails the build under a policy; empty where it passes. A channel that cannot be computed never passes. */
export function reasonsOf(review: ChannelReview, policy: Policy, thresholds: Thresholds): readonly string[] {
  const { file, head, state, appeared } = review;
  const say = (words: string) => `${file}: ${words}`;
  if (state === 'broken') return [say(review.notes[0] ?? 'HEAD could not be computed.')];
  if (policy === 'error') {
    const errors = head?.findings.filter(({ severity, waivedBy }) => severity === 'error' && !waivedBy) ?? [];
    return errors.length ? [say(`${show.count(errors, 'error')}, the first: ${errors[0].message}`)] : [];
  }
  if (policy === 'any') return state === 'no-effect' ? [] : [say(changeWords(review))];
  const errors = appeared.filter(({ severity }) => severity === 'error');
  return [...errors.map(({ message }) => say(`new error: ${message}`)), ...regressions(review, thresholds).map(say)];
}

const changeWords = ({ state, changes }: ChannelReview) =>
  state === 'changed' ? (changes[0]?.words ?? 'findings changed') : state;

/** Reserve and eye that fell by more than is let pass. */
function regressions({ base, head }: ChannelReview, { lossReserveDb, eyeHeightShare }: Thresholds): string[] {
  if (!base || !head) return [];
  const reserve = (analysis: Analysis, name: string) => {
    const outcome = analysis.limits.find((one) => one.kind === 'insertion-loss' && one.name === name);
    return outcome && outcome.limit.value - outcome.actual.value;
  };
  const loss = base.limits.flatMap(({ name }) => {
    const [before, after] = [reserve(base, name), reserve(head, name)];
    if (before === undefined || after === undefined || before - after <= lossReserveDb) return [];
    return [
      `the reserve of \`${name}\` fell from ${show.loss(before)} to ${show.loss(after)}, by more than ${show.loss(lossReserveDb)}`,
    ];
  });
  const [before, after] = [base, head].map(({ figures }) => figureNamed(figures, 'eye-height')?.value);
  const eyes = base.model.limits.filter((limit): limit is Limit<'eye'> => limit.kind === 'eye');
  const eye = eyes.flatMap(({ name, values: { height } }) => {
    if (!height || before === undefined || before - (after ?? 0) <= eyeHeightShare * height.value) return [];
    return [
      `the eye's height fell from ${show.voltage(before)} to ${show.voltage(after ?? 0)}, by more than ${show.percent(eyeHeightShare)} of \`${name}\` (${show.voltage(height.value)})`,
    ];
  });
  return [...loss, ...eye];
}
