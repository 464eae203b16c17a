import { evenDensity, type Workspace } from './isi-density';
import type { Levels } from './levels';
import { type NoisyTail, noisyTail } from './noisy-tail';

/** The eye before jitter: at each phase the main cursor and the distribution of all else. */
export interface EyeColumns {
  readonly perUi: number;
  /** Column of the sampling instant. */
  readonly centre: number;
  readonly mainCursors: Float64Array;
  readonly tails: readonly NoisyTail[];
  readonly binVolts: number;
}

export interface EqualisedPulse {
  /** Periodic; the main cursor is positive. */
  readonly pulse: Float64Array;
  readonly samplesPerUi: number;
  readonly mainIndex: number;
  /** Volts, at 1, 2, … UI after the main cursor. */
  readonly dfeTaps: readonly number[];
}

const mostPerUi = 32;
/** Columns beyond half a UI on either side, and beyond what jitter reaches there: a crossing need not lie half a UI from the sampling instant. */
const beyondReach = 2;
/** A bin is at most this share of the noise, and within these shares of the half span of the signal. */
const binsPerSigma = 16;
const fewestBins = 400;
const mostBins = 2000;

/**
 * Interference at each phase of a UI about the sampling instant, with noise. The DFE's feedback is constant over the UI.
 * Volts are those of symbols ±1/2 of full swing.
 * @param reachUi how early or late jitter may sample
 */
export function eyeColumns(
  { pulse, samplesPerUi, mainIndex, dfeTaps }: EqualisedPulse,
  levels: Levels,
  noiseVolts: number,
  reachUi = 0,
): EyeColumns {
  const perUi = Math.min(samplesPerUi, mostPerUi);
  const stride = samplesPerUi / perUi;
  const beyond = beyondReach + Math.ceil(Math.min(reachUi, 1) * perUi);
  const count = perUi + 1 + 2 * beyond;
  const centre = perUi / 2 + beyond;
  const uis = pulse.length / samplesPerUi;
  const cursors = (column: number): Float64Array => {
    const out = new Float64Array(uis);
    let place = mainIndex + (column - centre) * stride;
    for (let m = 0; m < uis; m++, place += samplesPerUi) {
      out[m] = pulse[((place % pulse.length) + pulse.length) % pulse.length];
    }
    dfeTaps.forEach((tap, i) => {
      if (i + 1 < uis) out[i + 1] -= tap;
    });
    return out;
  };
  const atCentre = cursors(centre);
  const interference = atCentre.reduce((sum, value, m) => (m === 0 ? sum : sum + Math.abs(value)), 0) / 2;
  // the last two bound the bins of the noise where next to no signal arrives
  const span = Math.max(interference, Math.abs(atCentre[0]) / 2, noiseVolts / 4, 1e-12);
  const binVolts = Math.max(span / mostBins, Math.min(span / fewestBins, noiseVolts / binsPerSigma));
  const noiseBins = noiseVolts / binVolts;
  const noisy = noiseBins >= binsPerSigma / 2;
  const space: Workspace = { front: new Float64Array(4), back: new Float64Array(4) };
  const mainCursors = new Float64Array(count);
  const tails: NoisyTail[] = [];
  const halves = levels.halves;
  for (let column = 0; column < count; column++) {
    const here = column === centre ? atCentre : cursors(column);
    mainCursors[column] = here[0];
    const amplitudes = new Float64Array(halves.length * (uis - 1));
    for (let h = 0; h < halves.length; h++) {
      const scale = halves[h] / binVolts;
      for (let m = 1; m < uis; m++) amplitudes[h * (uis - 1) + m - 1] = Math.abs(here[m]) * scale;
    }
    tails.push(noisyTail(evenDensity(amplitudes, noisy, space), noiseBins));
  }
  return { perUi, centre, mainCursors, tails, binVolts };
}
