import type { Place, PlaceEdit, TextRange } from './text/types';

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
