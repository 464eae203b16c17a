import type { AnyElement, Model } from '../model/types';
import type { Fix } from '../report';
import type { Place } from '../text/types';

/**
 * Scattering data of one mode of a two-port: 8 numbers a frequency, re and im of s11, s12, s21, s22.
 * Port 1 is the transmitter side.
 */
export type TwoPort = Float64Array;

/** Mixed-mode four-port: 32 numbers a frequency, row by row, re and im; ports in the order d1, c1, d2, c2 (1 the transmitter side). */
export type FourPort = Float64Array;

/**
 * Scattering data of one element or of a cascade on one list of frequencies (Hz; 0 allowed).
 * Differential is referred to the channel's reference impedance, common to a quarter of it; time runs as e^{+jωt}.
 * Single-ended: `differential` is that of the one conductor, the others are absent.
 */
export interface Network {
  readonly differential: TwoPort;
  readonly common?: TwoPort;
  /** Only where the modes convert; `differential` and `common` are then its diagonal blocks. */
  readonly full?: FourPort;
}

/** The grid: f_i = i × step, i = 0 … points - 1. */
export interface Grid {
  readonly stepHz: number;
  readonly points: number;
  readonly frequencies: Float64Array;
  /** Step = symbol rate / 2^k; end = 4 × Nyquist × 2^j. */
  readonly k: number;
  readonly j: number;
  /** Set where 16,384 points do not suffice; see `Cascade.remainingError`. */
  readonly tooCoarse?: true;
}

export interface NetworkContext {
  readonly frequencies: Float64Array;
  /** Differential reference; single-ended: of the conductor. */
  readonly referenceOhms: number;
  readonly singleEnded: boolean;
}

/** What is known of an element beside its network; shown in hovers and hints and read by rules. */
export interface ElementFacts {
  readonly lengthMeters?: number;
  /** Differential; single-ended: of the conductor. At Nyquist. */
  readonly impedanceOhms?: number;
  readonly commonImpedanceOhms?: number;
  /** Worst ends of its tolerance, where one is declared. */
  readonly impedanceRangeOhms?: readonly [number, number];
  readonly delaySeconds?: number;
  readonly skewSeconds?: number;
  /** Computed or chosen geometry, e.g. the width that gives the declared impedance. */
  readonly widthMeters?: number;
  readonly gapMeters?: number;
  /** `microstrip`, `stripline`, `coax`, … in the words shown to the user. */
  readonly construction?: string;
  readonly stubs: readonly StubFact[];
  /** Highest frequency for which there is data (Touchstone), and the lowest. */
  readonly dataRangeHz?: readonly [number, number];
}

export interface StubFact {
  /** Which side of the via or `end`. */
  readonly side: 'top' | 'bottom' | 'branch';
  readonly lengthMeters: number;
  /** Worst ends of its tolerance. */
  readonly lengthRangeMeters: readonly [number, number];
  /** Lowest notch of the stub alone with its pad loading (input impedance of the branch zero), nominal and at the longest. Infinity where none below 1 THz. */
  readonly notchHz: number;
  readonly lowestNotchHz: number;
}

/** Something the element's model says of itself: outside its range, a key left unused, data missing. Becomes a finding of rule `rule`. */
export interface ElementNote {
  readonly rule: string;
  readonly at: Place;
  readonly message: string;
  readonly fixes?: readonly Fix[];
  readonly value?: number;
  /** Default: higher. */
  readonly worse?: 'higher' | 'lower';
  readonly valueText?: string;
}

/** What fixes an element's network: plain numbers and strings only, since its JSON is the cache key (with the grid). */
export interface Prepared<P = unknown> {
  readonly parameters: P;
  readonly facts: ElementFacts;
  readonly notes: readonly ElementNote[];
}

/**
 * One kind of element.
 * `prepare` turns what is written into numbers; it never throws on user input: what is missing gives `undefined` (the model marks the
 * element incomplete before this, so that `prepare` may count on the required keys). Of the model it reads line rate, signalling,
 * reference, temperature, transmitter and receiver, never other elements: its result is kept while those and the element are the same.
 * `network` throws on a caller's mistake only.
 */
export interface ElementKind<P = unknown> {
  prepare(element: AnyElement, context: PrepareContext): Prepared<P> | undefined;
  network(parameters: P, context: NetworkContext): Network;
}

export interface PrepareContext {
  readonly model: Model;
  /** Touchstone files by path, parsed; see `networks/touchstone`. */
  readonly touchstone: (file: string) => import('./touchstone-types').TouchstoneResult | undefined;
}

export interface ElementNetwork {
  readonly element: AnyElement;
  readonly prepared?: Prepared;
  readonly network: Network;
  /** True for a straight through in place of what could not be computed or is included elsewhere. */
  readonly through: boolean;
  /** The same element at any other frequencies; a straight through where `network` is one. */
  readonly evaluate: (context: NetworkContext) => Network;
}

/** Stage 2. */
export interface Networks {
  readonly grid: Grid;
  readonly context: NetworkContext;
  readonly elements: readonly ElementNetwork[];
  /** Names left out because they are incomplete: verdict says "without …". */
  readonly without: readonly string[];
  /** Elements whose kind's code threw, which it never should; their network is a straight through. Each becomes a finding of rule `internal`. */
  readonly failures?: readonly { readonly element: AnyElement; readonly failure: unknown }[];
  /** Networks by content, of this and the last analysis; opaque. */
  readonly kept?: unknown;
  /** How many element networks were computed on the grid, not found. */
  readonly computed?: number;
}
