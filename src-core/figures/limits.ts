import type { AnyLimit, Limit } from '../model/types';
import type { Computed } from './computed';
import { eyeOutcome } from './eye-limit';
import { insertionLossOutcome } from './insertion-loss-limit';
import { returnLossOutcome } from './return-loss-limit';
import type { LimitOutcome } from './types';

function outcomeOf(limit: AnyLimit, computed: Computed): LimitOutcome | undefined {
  switch (limit.kind) {
    case 'insertion-loss':
      return insertionLossOutcome(limit as Limit<'insertion-loss'>, computed);
    case 'return-loss':
      return returnLossOutcome(limit as Limit<'return-loss'>, computed);
    case 'eye':
      return eyeOutcome(limit as Limit<'eye'>, computed);
  }
}

/** How each limit fares that can be judged now, in the order of the text. */
export const limitOutcomes = (computed: Computed): readonly LimitOutcome[] =>
  computed.model.limits.flatMap((limit) => outcomeOf(limit, computed) ?? []);
