import type {
  DrillRulesValues,
  ElementKindName,
  ElementValues,
  LimitKindName,
  LimitValues,
  Quantity,
  ReceiverValues,
  TransmitterValues,
} from '../../schemas/format/types';
import type { Roughness } from '../physics/roughness';
import type { Report } from '../report';
import type { FilePath, Place } from '../text/types';

export interface Point {
  readonly value: number;
  readonly atHz: number;
}

/** dk and df with the frequency at which they hold. Both directions are given; they are equal where only one is declared. */
export interface Material {
  readonly name: string;
  readonly dkThrough: Point;
  readonly dkInPlane: Point;
  readonly df: Point;
}

export interface Foil {
  /** At 20 degC. */
  readonly conductivity: number;
  readonly roughness: Roughness;
}

export type StackupLayer =
  | {
      readonly type: 'copper';
      readonly name: string;
      readonly thicknessMeters: number;
      readonly plane: boolean;
      readonly foil: Foil;
      readonly place: Place;
    }
  | {
      readonly type: 'dielectric';
      readonly name: string;
      readonly thicknessMeters: number;
      readonly material: Material;
      readonly place: Place;
    }
  | {
      readonly type: 'mask';
      readonly name: 'top' | 'bottom';
      readonly thicknessMeters: number;
      readonly material: Material;
      readonly place: Place;
    };

/** Top to bottom. */
export interface Stackup {
  readonly name: string;
  readonly place: Place;
  readonly layers: readonly StackupLayer[];
  readonly drillRules: { readonly backdrillMinimumMeters?: number; readonly backdrillToleranceMeters?: number };
}

/** A Touchstone file that an element names. */
export interface FileReference {
  readonly file: FilePath;
  readonly place: Place;
  readonly enter?: readonly number[];
  readonly leave?: readonly number[];
}

/** One element as read, part merged in, names resolved. What could not be read is absent from `values`. */
export interface Element<K extends ElementKindName = ElementKindName> {
  readonly kind: K;
  /** Its own name; `trace 3` (kind and position) where it has none yet. */
  readonly name: string;
  /** Position in `path`. */
  readonly index: number;
  readonly place: Place;
  readonly values: Partial<ElementValues[K]>;
  /** Where a key's value stands, in this file or in the part's; a key that is not written gives the element's place. */
  readonly places: Readonly<Record<string, Place>>;
  readonly stackup?: Stackup;
  /** A trace's layer, by name; absent if unknown. */
  readonly layer?: string;
  /** A via's ends, written or derived. */
  readonly from?: string;
  readonly to?: string;
  /** Keys whose value was derived or is a default that changes a figure, for inlay hints: `{ to: 'L6' }`. */
  readonly derived: Readonly<Record<string, string>>;
  readonly file?: FileReference;
  /** Name of the element whose file already holds this one: its network is a straight through. */
  readonly includedIn?: string;
  readonly reversed: boolean;
  readonly active: boolean;
  readonly budget?: Quantity;
  readonly owner?: string;
  /** Not computed: its network is a straight through and figures of the whole say "without `name`". A finding says why. */
  readonly incomplete: boolean;
}

export type AnyElement = { [K in ElementKindName]: Element<K> }[ElementKindName];

export interface Limit<K extends LimitKindName = LimitKindName> {
  readonly kind: K;
  readonly name: string;
  readonly index: number;
  readonly place: Place;
  readonly values: Partial<LimitValues[K]>;
  /** Positions in path, inclusive; all of path by default. Undefined if the names are unknown or reversed. */
  readonly between?: readonly [number, number];
}
export type AnyLimit = { [K in LimitKindName]: Limit<K> }[LimitKindName];

export interface Waiver {
  readonly index: number;
  readonly place: Place;
  readonly rule: string;
  readonly at: string;
  readonly upTo?: Quantity;
  readonly until: string;
  readonly by: string;
  readonly reason: string;
}

/** The transmitter in SI numbers, defaults filled in. Taps with the main one at index `pre.length`. */
export interface Transmitter {
  readonly place: Place;
  readonly written: Partial<TransmitterValues>;
  readonly swingVolts?: number;
  readonly riseTimeSeconds: number;
  readonly impedanceOhms: number;
  readonly commonImpedanceOhms: number;
  readonly capacitanceFarads: number;
  readonly taps: readonly number[];
  readonly mainTap: number;
  readonly randomJitterSeconds: number;
  readonly deterministicJitterSeconds: number;
}

export interface Receiver {
  readonly place: Place;
  readonly written: Partial<ReceiverValues>;
  readonly impedanceOhms: number;
  readonly commonImpedanceOhms: number;
  readonly capacitanceFarads: number;
  readonly bandwidthHz: number;
  readonly noiseVolts: number;
  readonly ctle:
    | 'none'
    | 'auto'
    | { readonly dcGainDb: number; readonly zeroHz: number; readonly polesHz: readonly number[] };
  readonly dfe: { readonly taps: number; readonly limit: number };
}

/** The channel as read, defaults filled in. Nothing here depends on ranges. */
export interface Model {
  readonly file: FilePath;
  readonly title: string;
  /** False where line rate or path could not be read, or the version is newer: nothing is computed. */
  readonly computable: boolean;
  readonly lineRate: number;
  readonly modulation: 'NRZ' | 'PAM4';
  readonly symbolRate: number;
  readonly nyquistFrequency: number;
  readonly unitInterval: number;
  readonly targetBer: number;
  readonly longestRun: number;
  readonly signalling: 'differential' | 'single-ended';
  readonly referenceOhms: number;
  readonly temperatureCelsius: number;
  readonly owners: readonly { readonly name: string; readonly budget: Quantity; readonly place: Place }[];
  readonly transmitter?: Transmitter;
  readonly receiver?: Receiver;
  readonly elements: readonly AnyElement[];
  readonly limits: readonly AnyLimit[];
  readonly waivers: readonly Waiver[];
  /** Files that take part, this one first. */
  readonly files: readonly FilePath[];
  /** Parts, stackups, materials, foils at hand, by the names under which this file may write them. */
  readonly names: NameTable;
  /** What the model stage found: schema errors, names, layers; each with its rule's name. */
  readonly reports: readonly (Report & { readonly rule: string; readonly subject?: string })[];
}

export interface NameEntry {
  readonly name: string;
  /** As it may be written in the channel: with prefix, and without where unambiguous. */
  readonly writtenAs: readonly string[];
  readonly place: Place;
  readonly kind?: ElementKindName;
}
export interface NameTable {
  readonly parts: readonly NameEntry[];
  readonly stackups: readonly (NameEntry & { readonly stackup?: Stackup })[];
  readonly materials: readonly NameEntry[];
  readonly foils: readonly NameEntry[];
}
export type { DrillRulesValues };
