import type { Cascade } from './cascade/types';
import type { Figure, Ledger, LimitOutcome, Verdict } from './figures/types';
import type { Link } from './link/types';
import type { Model } from './model/types';
import type { Networks } from './networks/types';
import type { Finding } from './report';
import type { ParsedFile } from './text/parsed';
import type { FileContent, FilePath } from './text/types';
import type { Time } from './time/types';

/** All that an analysis depends on. */
export interface Inputs {
  readonly file: FilePath;
  /** This file, the parts and Touchstone files that it names, directly or not, and the config. */
  readonly files: ReadonlyMap<FilePath, FileContent>;
  readonly configFile?: FilePath;
  /** For a parts file: the files that use it, where the host knows them (they are in `files` too). Without it nothing is called unused. */
  readonly dependents?: readonly FilePath[];
  /** `YYYY-MM-DD`, for waivers. */
  readonly today: string;
}

export interface AnalyseOptions {
  /** `time`: all but the link and the eye's rules (the last link is kept and marked stale); `link`: everything. */
  readonly until: 'model' | 'time' | 'link';
  /** While one types: the frequency grid of before is kept while it suffices. At rest it is left out, so that figures depend on the text alone. */
  readonly keepGrid?: boolean;
  /** Says whether the time for one file is over; asked between kernels. */
  readonly outOfTime?: () => boolean;
}

/**
 * Everything known of one file. Each stage is undefined where the one before could not be computed.
 * Kept stages are identical objects (===) when their own input did not change.
 */
export interface Analysis {
  readonly inputs: Inputs;
  readonly parsed: ReadonlyMap<FilePath, ParsedFile>;
  readonly model: Model;
  readonly networks?: Networks;
  readonly cascade?: Cascade;
  readonly time?: Time;
  readonly link?: Link;
  /** The link belongs to an older text: figures from it are shown with a mark. */
  readonly linkIsStale: boolean;
  readonly ledger?: Ledger;
  readonly figures: readonly Figure[];
  readonly limits: readonly LimitOutcome[];
  /** Severities applied, waivers applied, sorted by place; at most 200 shown. */
  readonly findings: readonly Finding[];
  readonly verdict: Verdict;
  /** Caches of stages, opaque; handed to the next `analyse`. */
  readonly kept: unknown;
  /** How many times each stage computed something in this call, for tests and the bench: `{ networks: 1, products: 5 }`. */
  readonly computed: Readonly<Record<string, number>>;
  /** Set where the time for one file was over. */
  readonly timedOut?: boolean;
}
