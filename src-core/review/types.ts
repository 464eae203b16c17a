import type { Analysis } from '../analysis';
import type { Figure, Verdict } from '../figures/types';
import type { Finding } from '../report';
import type { FilePath, Place } from '../text/types';

/** One revision's state of a channel. */
export interface Side {
  readonly analysis?: Analysis;
  /** Why there is none, as the end of a sentence: `is not there`, `is a link, which is not followed`. */
  readonly missing?: string;
}

/** The two states of one channel; absent where the revision has none. */
export interface ChannelPair {
  readonly base?: Side;
  readonly head?: Side;
  /** Head's path, else base's. */
  readonly file: FilePath;
  readonly renamedFrom?: FilePath;
  /** Files of the pair whose bytes differ between the two sides; tells whether the channel changed itself. */
  readonly changedFiles?: readonly FilePath[];
}

/** One difference between the two texts, or, where `derived`, what follows from them. */
export interface Change {
  /** Element, limit, `transmitter`, …, as head names it. */
  readonly subject: string;
  readonly attribute: string;
  readonly from?: string;
  readonly to?: string;
  readonly derived?: boolean;
  /** Changes what is computed; false for a comment's neighbour: a name, a unit, a reason, and for limits and waivers. */
  readonly electrical: boolean;
  readonly words: string;
  /** In head; for what was removed where it stood. */
  readonly at: Place;
  /** Changes of one number belong together; 0 for those without electrical effect and for what is derived. */
  readonly group: number;
}

export interface FigureChange {
  readonly name: string;
  readonly title: string;
  readonly from?: Figure;
  readonly to?: Figure;
  readonly deltaText: string;
  /** Absent where neither way is worse. */
  readonly better?: boolean;
}

/** What one group of changes does by itself. */
export interface Cause {
  readonly group: number;
  readonly words: string;
  /** The group added to BASE: from BASE's figures. */
  readonly alone: readonly FigureChange[];
  /** The group taken from HEAD: from HEAD's figures. */
  readonly without: readonly FigureChange[];
}

export interface ChannelReview {
  readonly file: FilePath;
  readonly renamedFrom?: FilePath;
  readonly lane?: string;
  readonly title: string;
  readonly state: 'changed' | 'no-effect' | 'added' | 'removed' | 'broken';
  /** `itself`, or the files because of which alone it changed. */
  readonly why: 'itself' | readonly FilePath[];
  readonly changes: readonly Change[];
  readonly figures: readonly FigureChange[];
  readonly appeared: readonly Finding[];
  readonly gone: readonly Finding[];
  /** Waivers added, removed or changed. */
  readonly waivers: readonly Change[];
  /** Limits, budgets and rules that allow more than before. */
  readonly loosened: readonly Change[];
  readonly verdict: { readonly from?: Verdict; readonly to?: Verdict };
  readonly causes: readonly Cause[];
  /** What the groups alone do not explain. */
  readonly together?: readonly FigureChange[];
  /** By how much the smallest margin fell, as a share of its limit. */
  readonly smallestMarginFall?: number;
  readonly notes: readonly string[];
  readonly base?: Analysis;
  readonly head?: Analysis;
}

export const policies = ['error', 'regression', 'any'] as const;
export type Policy = (typeof policies)[number];

export interface Thresholds {
  /** By how much the reserve of an insertion-loss limit may fall. */
  readonly lossReserveDb: number;
  /** By how much the eye's height may fall, as a share of its limit. */
  readonly eyeHeightShare: number;
}

export interface Review {
  readonly version: 1;
  readonly base: string;
  readonly head: string;
  /** Worst first. */
  readonly channels: readonly ChannelReview[];
  readonly unchanged: number;
  readonly notes: readonly string[];
  readonly failed: { readonly policy: Policy; readonly reasons: readonly string[] };
}
