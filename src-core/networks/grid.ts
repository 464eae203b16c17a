import type { Model } from '../model/types';
import { spectrumShare } from './pulse-spectrum';
import type { Grid } from './types';

/** Most points of a grid. */
export const mostPoints = 16384;
/** Coarsest step: symbol rate / 2^8, so that plots and resonances of short channels have enough points. */
const leastK = 8;
/** Most that the frequencies beyond the grid may add to a cursor, by the main one. */
const endShare = 0.001;
/** While one types, a grid that is finer than needed by this many halvings is kept. */
const keptHalvings = 2;

/** What the grid has to hold. */
export interface Decay {
  /** Time in which the response decays by 60 dB, its delay included. */
  readonly decaySeconds: number;
  /** The delay's part of it. */
  readonly delaySeconds: number;
}

/**
 * The frequency grid of a channel.
 *
 * Step = symbol rate / 2^k with the smallest k ≥ 8 for which it is at most 1 / (4 × the time, delay included, in which the response
 * decays by 60 dB): a response longer than 1/step would wrap round onto itself. End = 4 × Nyquist × 2^j with the smallest j for which
 * the pulse's spectrum beyond it (symbol, edge and receiver filter, without the channel's loss) is at most 0.1 % of its area.
 * At most 16,384 points; beyond that the step stays too coarse, `tooCoarse` says so, and the cascade measures what that does to a cursor.
 *
 * Hysteresis: with a `previous` grid of the same symbol rate, that one is kept while it satisfies both conditions and is not finer than needed
 * by more than two halvings in k and one in j. It is handed in while one types, so that most edits keep the grid; at rest it is left out,
 * so that the figures at rest depend on the text alone and not on how it was typed.
 */
export function chooseGrid(model: Model, decay: Decay, previous?: Grid): Grid {
  const { symbolRate } = model;
  const k = Math.max(leastK, Math.ceil(Math.log2(4 * decay.decaySeconds * symbolRate)));
  let j = 0;
  while (j < 4 && spectrumShare(model, 2 * symbolRate * 2 ** j, 64 * symbolRate) > endShare) j++;
  const mostK = Math.floor(Math.log2(mostPoints - 1)) - 1 - j;
  if (previous && sameRate(previous, symbolRate) && k <= mostK) {
    const spareK = previous.k - k;
    const spareJ = previous.j - j;
    if (spareK >= 0 && spareK <= keptHalvings && spareJ >= 0 && spareJ <= 1) return previous;
  }
  const grid = gridOf(symbolRate, Math.min(k, mostK), j);
  return k <= mostK ? grid : { ...grid, tooCoarse: true };
}

/** The grid of given k and j. */
export function gridOf(symbolRate: number, k: number, j: number): Grid {
  const stepHz = symbolRate / 2 ** k;
  const points = 2 ** (k + j + 1) + 1;
  const frequencies = new Float64Array(points);
  for (let i = 0; i < points; i++) frequencies[i] = i * stepHz;
  return { stepHz, points, frequencies, k, j };
}

const sameRate = ({ stepHz, k }: Grid, symbolRate: number) =>
  Math.abs(stepHz * 2 ** k - symbolRate) < 1e-9 * symbolRate;
