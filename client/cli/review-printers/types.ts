import type { Review } from '../../../src-core/review/index';

export interface ReviewPrinterContext {
  readonly version: string;
  readonly colour: boolean;
  /** Most bytes of UTF-8; Markdown only. */
  readonly maxLength: number;
}

/** The whole of a review as one text. */
export type ReviewPrinter = (review: Review, context: ReviewPrinterContext) => string;
