import type { Analysis } from '../analysis';
import type { Place, PlaceEdit, TextRange } from '../text/types';

export type Severity = 'error' | 'warning' | 'info' | 'hint';

/** An edit that answers a finding. Its title says what is gained, computed from the response where the physics changes. */
export interface Fix {
  readonly title: string;
  readonly edits: readonly PlaceEdit[];
  /** The one to take where there are several. */
  readonly preferred?: boolean;
  /** Does not change what is computed from a valid file (spelling, unit, dead waiver): allowed in fix-all and `check --fix`. */
  readonly safe?: boolean;
  /**
   * The same fix with a title that tells all that it gains, where that costs a recomputation of the link. Called when a fix is
   * shown, not while one types; keeps its result.
   */
  readonly resolve?: () => Fix;
}

export interface Related {
  readonly at: Place;
  readonly message: string;
}

/** What a rule or the reader of a text says. */
export interface Report {
  readonly at: Place;
  /** Only for findings about text that has no place: a range inside `at.file`, of this very text. */
  readonly range?: TextRange;
  readonly message: string;
  /** How bad it is, in the unit of `valueText`, for waivers' `up-to`; larger is worse if `worse` is 'higher'. */
  readonly value?: number;
  readonly worse?: 'higher' | 'lower';
  readonly valueText?: string;
  readonly related?: readonly Related[];
  readonly fixes?: readonly Fix[];
  readonly tags?: readonly ('unnecessary' | 'deprecated')[];
}

export interface Finding extends Report {
  readonly rule: string;
  readonly severity: Severity;
  /** The element or limit that it is about, by name: a waiver's `at`, and part of the stable identity. */
  readonly subject?: string;
  /** Set where a waiver accepts it: it then counts for nothing and is shown as accepted. */
  readonly waivedBy?: Place;
}

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
