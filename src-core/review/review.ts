import type { FilePath } from '../text/types';
import { type ReviewOptions, reviewChannel } from './channel';
import { defaultThresholds, reasonsOf } from './policy';
import type { ChannelPair, ChannelReview, Policy, Review, Thresholds } from './types';

export interface ReviewCall extends ReviewOptions {
  /** As the sides are called. */
  readonly base: string;
  readonly head: string;
  readonly policy: Policy;
  readonly thresholds?: Thresholds;
  /** For channels whose own configuration says otherwise, by file. */
  readonly settings?: ReadonlyMap<FilePath, { readonly policy?: Policy; readonly thresholds: Thresholds }>;
  /** Channels whose files are the same on both sides. */
  readonly unchanged?: number;
  readonly notes?: readonly string[];
}

/** The review of a set of channels, worst first. */
export function reviewOf(pairs: Iterable<ChannelPair>, call: ReviewCall): Review {
  const channels: ChannelReview[] = [];
  for (const pair of pairs) channels.push(reviewChannel(pair, call));
  return joinReviews(channels, call);
}

/** Puts reviewed channels in order and judges them by the policy. Those that only use a changed file and do not feel it are counted. */
export function joinReviews(channels: readonly ChannelReview[], call: ReviewCall): Review {
  const { base, head, policy, thresholds = defaultThresholds } = call;
  const silent = channels.filter(
    ({ state, why, changes }) => state === 'no-effect' && why !== 'itself' && changes.length === 0,
  );
  const shown = channels.filter((channel) => !silent.includes(channel)).sort(worseFirst);
  const untouched = [...new Set(silent.flatMap(({ why }) => (why === 'itself' ? [] : why)))].sort();
  return {
    version: 1,
    base,
    head,
    channels: shown,
    unchanged: (call.unchanged ?? 0) + silent.length,
    notes: [
      ...(call.notes ?? []),
      ...untouched.map(
        (file: FilePath) => `${file} changed; ${count(silent, file)} of those that use it do not feel it.`,
      ),
    ],
    failed: {
      policy,
      reasons: shown.flatMap((channel) => {
        const own = call.settings?.get(channel.file);
        return reasonsOf(channel, own?.policy ?? policy, own?.thresholds ?? thresholds);
      }),
    },
  };
}

const count = (channels: readonly ChannelReview[], file: FilePath) =>
  channels.filter(({ why }) => why !== 'itself' && why.includes(file)).length;

const RANK: Readonly<Record<ChannelReview['state'], number>> = {
  broken: 0,
  changed: 1,
  added: 1,
  removed: 2,
  'no-effect': 3,
};

/** What cannot be computed, then the deepest fall of the smallest margin, then what has no effect; by name where all that is equal. */
function worseFirst(a: ChannelReview, b: ChannelReview): number {
  const fall = (review: ChannelReview) =>
    review.smallestMarginFall ?? (review.appeared.some(({ severity }) => severity === 'error') ? Number.MAX_VALUE : 0);
  return RANK[a.state] - RANK[b.state] || fall(b) - fall(a) || (a.file < b.file ? -1 : a.file > b.file ? 1 : 0);
}
