import type { Analysis } from '../analysis';

/** A picture as plain data; the renderer, the CSV, the data table and the screen reader's sentence all come from it. */
export interface PlotDescription {
  readonly name: string;
  readonly title: string;
  readonly x: Axis;
  readonly y: Axis;
  readonly series: readonly Series[];
  /** Limits drawn as lines, points or closed masks, with their name. */
  readonly limits: readonly PlotLimit[];
  readonly marks: readonly Mark[];
  /** Values of x worth a thin line and a word: the Nyquist frequency. */
  readonly guides?: readonly { readonly x: number; readonly label: string }[];
  readonly heat?: Heat;
  /** One sentence for a screen reader and for `report --format md`. */
  readonly summary: string;
  /** Belongs to an older text. */
  readonly stale?: boolean;
}

/** Values are SI (`Hz`, `s`, `V`, `ohm`) or `dB`, `UI`; the renderer chooses the prefix. */
export interface Axis {
  readonly label: string;
  readonly unit: string;
  readonly domain: readonly [number, number];
  /** Larger values lie lower, as for a loss. */
  readonly downwards?: boolean;
}

export interface Series {
  readonly name: string;
  readonly x: ArrayLike<number>;
  readonly y: ArrayLike<number>;
  /** `line` (the default), `stems` from zero, or a `loop` whose last point joins its first. */
  readonly draw?: 'line' | 'stems' | 'loop';
}

export interface PlotLimit {
  readonly name: string;
  readonly x: ArrayLike<number>;
  readonly y: ArrayLike<number>;
  readonly met: boolean;
  /** The side that is not allowed, in values (not in pixels); `inside` for a closed mask. */
  readonly forbidden?: 'above' | 'below' | 'inside';
}

/** A density: `values` row by row, `columns` in each, the first row at `y[0]`; log10, not below `floor`. */
export interface Heat {
  readonly columns: number;
  readonly rows: number;
  readonly x: readonly [number, number];
  readonly y: readonly [number, number];
  readonly values: ArrayLike<number>;
  readonly floor: number;
  readonly unit: string;
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
