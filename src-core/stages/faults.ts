import type { Inputs } from '../analysis';
import type { Finding } from '../report';
import type { Place } from '../text/types';

/** A stage of ours that threw, which none should. */
export interface Fault {
  /** The stage or the element that it was working on. */
  readonly stage: string;
  readonly error: unknown;
  readonly at?: Place;
}

/** One finding a fault: told where it broke, with the rest still judged. */
export function internalFindings({ file }: Inputs, faults: readonly Fault[]): readonly Finding[] {
  return faults.map(({ stage, error, at }) => ({
    rule: 'internal',
    severity: 'error',
    at: at ?? { file, path: [] },
    ...(at && { subject: stage }),
    message: `Lanewright itself broke at \`${stage}\`: ${wordsOf(error)}. This is a fault of Lanewright, not of the file; the rest was analysed.`,
  }));
}

const wordsOf = (error: unknown) => (error instanceof Error ? error.message : String(error)).slice(0, 300);

/** The time for one file is over; caught where the stages are composed. */
export class OutOfTime extends Error {}
