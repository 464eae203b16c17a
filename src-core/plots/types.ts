import type { Analysis } from '../analysis';

/** A picture as plain data; the renderer, the CSV and the screen reader's sentence all come from it. */
export interface PlotDescription {
  readonly name: string;
  readonly title: string;
  readonly x: Axis;
  readonly y: Axis;
  readonly series: readonly Series[];
  /** Limits drawn as lines or steps with their name. */
  readonly limits: readonly { readonly name: string; readonly x: ArrayLike<number>; readonly y: ArrayLike<number>; readonly met: boolean }[];
  readonly marks: readonly Mark[];
  readonly heat?: { readonly columns: number; readonly rows: number; readonly x: readonly [number, number]; readonly y: readonly [number, number]; readonly values: ArrayLike<number>; readonly floor: number; readonly unit: string };
  /** One sentence for a screen reader and for `report --format md`. */
  readonly summary: string;
  /** Belongs to an older text. */
  readonly stale?: boolean;
}
export interface Axis {
  readonly label: string;
  readonly unit: string;
  readonly domain: readonly [number, number];
  readonly downwards?: boolean;
}
export interface Series {
  readonly name: string;
  readonly x: ArrayLike<number>;
  readonly y: ArrayLike<number>;
}
export interface Mark {
  readonly x: number;
  readonly y: number;
  readonly label: string;
  /** Selects its lines in the text. */
  readonly element?: string;
}
export interface Plot {
  readonly name: string;
  readonly title: string;
  /** undefined: nothing to draw yet, in which case the surface says why. */
  describe(analysis: Analysis): PlotDescription | undefined;
}
