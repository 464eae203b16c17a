import type { ElementNetwork, Grid, TwoPort } from '../networks/types';
import { insertionLossAt, phaseDelay, worstReturnLoss } from './measures';

/** What one element does by itself, between two ends of the reference impedance. */
export interface ElementMeasures {
  readonly ownLossDb: number;
  readonly delaySeconds: number;
  readonly worstReturnLossDb: number;
}

const kept = new WeakMap<TwoPort, { grid: Grid; nyquist: number; measures: ElementMeasures }>();

/** Measured once for a network, since most edits leave most elements as they are. */
export function measuresOf({ network, prepared }: ElementNetwork, grid: Grid, nyquist: number): ElementMeasures {
  const s = network.differential;
  const known = kept.get(s);
  if (known && known.grid === grid && known.nyquist === nyquist) return known.measures;
  const measures = {
    ownLossDb: insertionLossAt(s, grid, nyquist),
    delaySeconds: prepared?.facts.delaySeconds ?? phaseDelay(s, grid, nyquist),
    worstReturnLossDb: worstReturnLoss(s, grid, nyquist).lossDb,
  };
  kept.set(s, { grid, nyquist, measures });
  return measures;
}
