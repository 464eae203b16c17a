import type { TextRange } from '../text/types';

/** A Touchstone file as read. Errors carry ranges in that file's text. */
export interface TouchstoneData {
  readonly ports: number;
  readonly referenceOhms: readonly number[];
  /** Ascending, Hz. */
  readonly frequencies: Float64Array;
  /** S, row by row, re and im: 2·N² numbers a frequency, referred to `referenceOhms`. */
  readonly s: Float64Array;
  readonly quality: TouchstoneQuality;
}

export interface TouchstoneQuality {
  /** Largest singular value and where. */
  readonly largestSingularValue: number;
  readonly worstPassivityHz: number;
  /** Largest |Sij − Sji| and where. */
  readonly largestNonReciprocity: number;
  readonly worstReciprocityHz: number;
  /** IEEE 370-2020 initial figures, per cent. */
  readonly passivityPercent: number;
  readonly reciprocityPercent: number;
  readonly causalityPercent: number;
}

export interface TouchstoneError {
  readonly line: number;
  readonly range: TextRange;
  readonly message: string;
  /** It is more than what is read of a file, not wrong in itself. */
  readonly rule?: 'limit';
}

export interface TouchstoneResult {
  readonly data?: TouchstoneData;
  readonly errors: readonly TouchstoneError[];
}
