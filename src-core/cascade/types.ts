import type { Network } from '../networks/types';

/** A dip of the cascade's transmission, refined between grid points on the networks themselves. */
export interface Resonance {
  readonly frequencyHz: number;
  /** What its elements add to the insertion loss there, dB. */
  readonly depthDb: number;
  /** Insertion loss there. */
  readonly lossDb: number;
  /** Frequency over the width in which the dip is less than 3 dB above its bottom; see `cascade/resonances.ts`. */
  readonly quality: number;
  /** The elements that make it; two where they are alike within 2 %. */
  readonly elements: readonly string[];
}

/** Stage 3: all of path, and the tree of partial products that gives any `between` cheaply. */
export interface Cascade {
  readonly total: Network;
  /** Network from the input of element i to the output of element j, inclusive. Kept. */
  readonly between: (from: number, to: number) => Network;
  readonly resonances: readonly Resonance[];
  /** Set where the grid is too coarse for the response: share of the main cursor by which what folds back may falsify a cursor. */
  readonly remainingError?: number;
  /** Products by their two factors, handed from one cascade to the next; opaque. */
  readonly kept?: unknown;
  /** How many products were computed, not found. */
  readonly products?: number;
}
