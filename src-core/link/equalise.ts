import type { Model } from '../model/types';
import { automaticCtle, type Ctle, ratioOfDb } from '../time/filters';
import type { Time } from '../time/types';
import { solveDfe } from './dfe';
import { figureOfMeritDb } from './figure-of-merit';
import type { Levels } from './levels';
import { noiseBandwidths, shapedNoise } from './noise';
import { weighted, weightsAt } from './resample';
import { samplingInstant } from './sampling-instant';

/** One setting of the receiver, and where it samples. Volts are those of the declared swing. */
export interface Equalised {
  /** Periodic, positive at its peak. */
  readonly pulse: Float64Array;
  /** The receiver swaps the legs: the path turns the signal over. */
  readonly inverted: boolean;
  /** In samples, between them. */
  readonly instant: number;
  readonly noiseVolts: number;
  readonly ctleDcGainDb?: number;
}

/** DC gains that `ctle: auto` tries. Source: IEEE 802.3 Table 93-8. */
const automaticGainsDb = Array.from({ length: 13 }, (_, i) => -i);

/** The pulse behind the receiver's linear equaliser: as declared, or for `auto` with the DC gain of the best figure of merit. */
export function equalise(model: Model, time: Time, levels: Levels): Equalised {
  const swing = model.transmitter?.swingVolts ?? 1;
  const noise = model.receiver?.noiseVolts ?? 0;
  const bandwidthHz = model.receiver?.bandwidthHz ?? 0.75 * model.symbolRate;
  const ctle = model.receiver?.ctle ?? 'none';
  if (ctle !== 'auto' || !time.ctleParts) {
    const declared: Ctle | undefined = typeof ctle === 'object' ? ctle : undefined;
    return {
      ...settled(scaled(time.pulse, swing), model, time.samplesPerUi),
      noiseVolts: shapedNoise(noise, bandwidthHz, declared),
      ctleDcGainDb: declared?.dcGainDb,
    };
  }
  const { flat, rising } = time.ctleParts;
  const bands = noiseBandwidths(bandwidthHz, automaticCtle(model.symbolRate));
  const plain = noiseBandwidths(bandwidthHz).flat;
  let best: (Equalised & { readonly merit: number }) | undefined;
  for (const dcGainDb of automaticGainsDb) {
    const g = ratioOfDb(dcGainDb);
    const pulse = scaled(rising, swing, flat, g * swing);
    const noiseVolts = noise * Math.sqrt((g * g * bands.flat + g * bands.cross + bands.rising) / plain);
    const setting = { ...settled(pulse, model, time.samplesPerUi), noiseVolts, ctleDcGainDb: dcGainDb };
    const merit = meritOf(setting, model, time.samplesPerUi, levels);
    if (!best || merit > best.merit) best = { ...setting, merit };
  }
  return best!;
}

/** a × first + b × second. */
function scaled(first: Float64Array, a: number, second?: Float64Array, b = 0): Float64Array {
  const out = new Float64Array(first.length);
  if (second) for (let i = 0; i < out.length; i++) out[i] = a * first[i] + b * second[i];
  else for (let i = 0; i < out.length; i++) out[i] = a * first[i];
  return out;
}

/** Turns the pulse up and finds the sampling instant. `pulse` is this function's to change. */
function settled(pulse: Float64Array, model: Model, samplesPerUi: number) {
  let [highest, lowest] = [0, 0];
  for (let i = 1; i < pulse.length; i++) {
    if (pulse[i] > pulse[highest]) highest = i;
    else if (pulse[i] < pulse[lowest]) lowest = i;
  }
  const inverted = -pulse[lowest] > pulse[highest];
  if (inverted) for (let i = 0; i < pulse.length; i++) pulse[i] = -pulse[i];
  const { taps, limit } = dfeOf(model);
  const peak = inverted ? lowest : highest;
  return { pulse, inverted, instant: samplingInstant(pulse, samplesPerUi, taps > 0 ? limit : 0, peak) };
}

/** Absent receivers have no taps. */
export const dfeOf = ({ receiver }: Model) => receiver?.dfe ?? { taps: 0, limit: 0 };

/** Deterministic jitter counts half of its peak to peak, random its rms. */
export function jitterOf({ transmitter, unitInterval }: Model) {
  return {
    randomUi: (transmitter?.randomJitterSeconds ?? 0) / unitInterval,
    deterministicUi: (transmitter?.deterministicJitterSeconds ?? 0) / unitInterval,
  };
}

function meritOf({ pulse, instant, noiseVolts }: Equalised, model: Model, samplesPerUi: number, levels: Levels) {
  const uis = pulse.length / samplesPerUi;
  const first = Math.floor(instant);
  const w = weightsAt(instant - first);
  const cursors = new Float64Array(uis);
  for (let m = 0; m < uis; m++) cursors[m] = weighted(pulse, first + m * samplesPerUi, w);
  const { taps, limit } = dfeOf(model);
  const corrected = solveDfe(cursors[0], cursors.subarray(1), taps, limit);
  let interferenceSquared = 0;
  for (let m = 1; m < uis; m++) interferenceSquared += (cursors[m] - (corrected[m - 1] ?? 0)) ** 2;
  // at the instant itself, not at the nearest sample: settings lie close together
  let slopesSquared = 0;
  for (let m = 0; m < uis; m++) {
    const place = first + m * samplesPerUi;
    const rise = weighted(pulse, place + 1, w) - weighted(pulse, place - 1, w);
    slopesSquared += ((rise * samplesPerUi) / 2) ** 2;
  }
  const { randomUi, deterministicUi } = jitterOf(model);
  return figureOfMeritDb(
    {
      mainCursor: cursors[0],
      interferenceSquared,
      slopesSquared,
      jitterUi: Math.hypot(randomUi, deterministicUi / 2),
      noiseVolts,
    },
    levels,
  );
}
