import type { Model } from '../model/types';
import type { Time } from '../time/types';
import { solveDfe } from './dfe';
import { droopOf } from './droop';
import { dfeOf, equalise, jitterOf } from './equalise';
import { eyeColumns } from './eye-columns';
import { eyeDensity } from './eye-density';
import { bathtubOf, type Eye, eyeHeight } from './eye-measures';
import { jitterNodes, jitterReach } from './jitter';
import { levelsOf } from './levels';
import { shifted } from './resample';
import type { Link } from './types';

/** Cursors below this share of the main one are not listed at either end. */
const listed = 1e-4;
const mostPrecursors = 16;
const fewestPostcursors = 8;

/**
 * Stage 5: equalisers, sampling instant, cursors, and the statistical eye at the target bit error ratio.
 *
 * Volts belong to symbols of full swing (NRZ ±1/2, PAM4 ±1/2 and ±1/6 of it). Interference is the exact density of independent symbols,
 * noise and random jitter are normal, deterministic jitter is dual Dirac, both at the sampling instant. Droop of the longest
 * run is taken off both sides as if it always were there: cautious. The eye's height is the distance of the two thresholds at which the
 * bit errors reach the target; for PAM4 of the smallest eye, were all three as bad as that.
 * The picture in `density` is computed when first read.
 */
export function computeLink(model: Model, time: Time): Link {
  const { samplesPerUi } = time;
  const levels = levelsOf(model.modulation);
  const setting = equalise(model, time, levels);
  const mainIndex = Math.floor(setting.instant);
  const pulse = shifted(setting.pulse, setting.instant - mainIndex);
  const uis = pulse.length / samplesPerUi;
  const at = (m: number) => pulse[(((mainIndex + m * samplesPerUi) % pulse.length) + pulse.length) % pulse.length];
  const mainCursorVolts = at(0);
  const { taps, limit } = dfeOf(model);
  const dfeTaps = solveDfe(
    mainCursorVolts,
    Array.from({ length: Math.min(taps, uis - 1) }, (_, i) => at(i + 1)),
    taps,
    limit,
  );
  // what a constant level settles at: the sum of all cursors
  const settledVolts = pulse.reduce((sum, value) => sum + value, 0) / samplesPerUi;
  const droopVolts = Math.abs(settledVolts) * (droopOf(model)?.share ?? 0);
  const { randomUi, deterministicUi } = jitterOf(model);
  const columns = eyeColumns(
    { pulse, samplesPerUi, mainIndex, dfeTaps },
    levels,
    setting.noiseVolts,
    jitterReach(randomUi, deterministicUi),
  );
  const eye: Eye = {
    columns,
    levels,
    nodes: jitterNodes(randomUi, deterministicUi, columns.perUi),
    droopVolts: droopVolts / 2,
    targetBer: model.targetBer,
  };
  const { widthUi, ...bathtub } = bathtubOf(eye);
  const open = mainCursorVolts > 0;
  const listedCursors = significant(at, uis, mainCursorVolts, Math.max(taps, fewestPostcursors));
  return {
    pulse,
    sampleSeconds: time.sampleSeconds,
    pulseStartSeconds: (setting.instant - mainIndex) * time.sampleSeconds,
    samplesPerUi,
    mainIndex,
    ...listedCursors,
    mainCursorVolts,
    dfeTaps,
    ...(setting.ctleDcGainDb === undefined ? {} : { ctleDcGainDb: setting.ctleDcGainDb }),
    ...(setting.inverted ? { inverted: true } : {}),
    noiseVolts: setting.noiseVolts,
    droopVolts,
    eyeHeightVolts: open ? eyeHeight(eye) : 0,
    eyeWidthUi: open ? widthUi : 0,
    density: eyeDensity(eye),
    bathtub,
    without: [...(model.transmitter ? [] : ['transmitter']), ...(model.receiver ? [] : ['receiver'])],
  };
}

/** Cursors from the first to the last that matters. */
function significant(at: (m: number) => number, uis: number, main: number, fewest: number) {
  const matters = (m: number) => Math.abs(at(m)) >= listed * Math.abs(main);
  let precursors = Math.min(mostPrecursors, Math.floor(uis / 4));
  while (precursors > 1 && !matters(-precursors)) precursors--;
  let last = uis - 1 - precursors;
  while (last > fewest && !matters(last)) last--;
  return { precursors, cursors: Float64Array.from({ length: precursors + 1 + last }, (_, i) => at(i - precursors)) };
}
