/** One figure that a user sees: value and the one text that every surface shows. */
export interface Figure {
  /** Stable key in JSON: `insertion-loss-at-nyquist`. */
  readonly name: string;
  readonly title: string;
  readonly value: number;
  readonly unit: string;
  readonly text: string;
  /** Which way is worse. */
  readonly worse: 'higher' | 'lower' | 'neither';
  /** An estimate, with the words of caution where they matter. */
  readonly note?: string;
}

export interface LedgerRow {
  readonly element: string;
  readonly kind: string;
  readonly index: number;
  readonly figures: readonly Figure[]; // own loss at Nyquist, delay, impedance, worst reflection, first resonance
  readonly owner?: string;
  /** Held against own loss. */
  readonly budget?: {
    readonly allowedDb: number;
    readonly spentDb: number;
    readonly share: number;
    readonly text: string;
  };
  /** Running sum of own loss at Nyquist along the path, dB and its share of the loss limit at Nyquist where there is one. */
  readonly cumulativeDb: number;
  readonly cumulativeShare?: number;
}

/** How each limit fares. */
export interface LimitOutcome {
  readonly name: string;
  readonly kind: string;
  readonly met: boolean;
  readonly limit: Figure;
  readonly actual: Figure;
  /** Positive: in hand. As a share of the limit. */
  readonly marginShare: number;
  readonly text: string;
  /** Where in frequency the least margin was found; loss and return loss only. */
  readonly atHz?: number;
  /** The end seen from; return loss only. */
  readonly end?: 'transmitter' | 'receiver';
  /** Height and width hold, and the rhombus between them cuts the contour; eye only. */
  readonly cornersCut?: boolean;
}

export interface Ledger {
  readonly rows: readonly LedgerRow[];
  /** What is missing from the sum of own losses to the channel's figure. */
  readonly reflectionsDb: number;
  readonly owners: readonly {
    readonly owner: string;
    readonly allowedDb?: number;
    readonly spentDb: number;
    readonly text: string;
  }[];
}

export interface Verdict {
  readonly state: 'good' | 'warnings' | 'errors' | 'not-computed';
  /** One line: `meets its limits: 18.2 dB of 24 dB at 12.9 GHz, eye 61 mV × 0.48 UI`. */
  readonly text: string;
}
