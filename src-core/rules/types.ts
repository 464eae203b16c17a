import type { Analysis } from '../analysis';
import type { Report, Severity } from '../report';

/** The stage a rule reads last; it runs again only when that stage's result changed. */
export type StageName = 'model' | 'networks' | 'cascade' | 'time' | 'link';

export interface Rule<Options extends Record<string, unknown> = Record<string, never>> {
  readonly name: string;
  readonly severity: Severity;
  readonly reads: StageName;
  /** Defaults; `lanewright.config.yaml` overrides each by name. */
  readonly options: Options;
  /** One paragraph: what is wrong, why it matters, what to do; the source or "common practice". */
  readonly doc: string;
  /** YAML laid over the complete base channel of `rules/testing.ts`: gives just this finding. */
  readonly bad: string;
  /** Rules whose findings come with it of necessity in `bad`: a limit that fails has its reason, too. */
  readonly alsoGives?: readonly string[];
  /** The same, just met: no finding at all. */
  readonly good: string;
  check(analysis: Judged, options: Options): Iterable<Report & { subject?: string }>;
}

/** What rules may read: an analysis before it is judged. */
export type Judged = Omit<Analysis, 'findings' | 'verdict' | 'kept' | 'computed'>;

/** A rule of any options, as the list and the judge handle it. */
// biome-ignore lint/suspicious/noExplicitAny: each rule knows its own options; the judge hands them over unread
export type AnyRule = Rule<any>;
