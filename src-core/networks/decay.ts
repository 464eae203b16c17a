import type { Model } from '../model/types';
import type { Decay } from './grid';
import { inverseTransform } from './inverse-transform';
import { terminatedPulse, terminationReflection } from './terminated-pulse';
import type { ElementFacts, Grid, Network } from './types';

/** The decay that the estimate looks for: 60 dB, an amplitude of 1/1000. */
const decayed = 1e-3;
/** A round trip without loss would ring for ever; more trips than this are counted as a grid that does not suffice. */
const mostTrips = 1000;

/** Of one element, at each of `probeFrequencies`. */
export interface Probe {
  /** The larger of |s11| and |s22|. */
  readonly reflections: readonly number[];
  /** |s21|, at most 1. */
  readonly transmissions: readonly number[];
  readonly delaySeconds: number;
}

/** Where elements are probed: an eighth, a quarter, a half and the whole of Nyquist. */
export const probeFrequencies = (nyquist: number) => Float64Array.of(nyquist / 8, nyquist / 4, nyquist / 2, nyquist);
const [quarter, whole] = [1, 3];

export function probeOf({ differential: s }: Network, facts: ElementFacts | undefined, nyquist: number): Probe {
  const at = (i: number) => Math.min(1, Math.hypot(s[i], s[i + 1]));
  const points = [0, 1, 2, 3].map((point) => 8 * point);
  const phase = -Math.atan2(s[5], s[4]);
  return {
    reflections: points.map((i) => Math.max(at(i), at(i + 6))),
    transmissions: points.map((i) => at(i + 4)),
    delaySeconds: facts?.delaySeconds ?? Math.max(0, phase) / (2 * Math.PI * (nyquist / 8)),
  };
}

/**
 * Estimate of the time in which the channel's pulse response decays by 60 dB, from its elements alone: their delays, the diffusion tail
 * of their skin effect, and the echoes between each two of them, ends of the channel included.
 * Holds within a factor of about two; `measuredDecay` checks it on the computed response.
 */
export function estimatedDecay(model: Model, probes: readonly Probe[]): Decay {
  const delaySeconds = probes.reduce((sum, probe) => sum + probe.delaySeconds, 0);
  const settle = Math.max(skinTail(model, probes), echoes(betweenEnds(model, probes)));
  return { delaySeconds, decaySeconds: delaySeconds + 3 * model.unitInterval + settle };
}

/**
 * Skin loss of a nepers at Nyquist has the impulse response k/(2√π) t^(-3/2) exp(−k²/4t), k = a/√(π f_Nyquist); a symbol's tail
 * is a unit interval of it. Source: Wigington and Nahman, Proc. IRE 45, 1957, 166-174.
 */
function skinTail({ nyquistFrequency, unitInterval }: Model, probes: readonly Probe[]): number {
  const lossAt = (point: number) =>
    probes.reduce((sum, { transmissions }) => sum - Math.log(Math.max(1e-6, transmissions[point])), 0);
  const [low, high] = [lossAt(quarter), lossAt(whole)];
  const skin = Math.max(0, Math.min(high, 4 * low - high)); // the a of a√x + bx through x = 1/4 and 1
  const main = Math.min(0.8, Math.max(0.02, Math.exp(-(low + high) / 2)));
  const k = skin / Math.sqrt(Math.PI * nyquistFrequency);
  return ((k * unitInterval) / (2 * Math.sqrt(Math.PI) * decayed * main)) ** (2 / 3);
}

/** The elements between what the two ends reflect. */
function betweenEnds(model: Model, probes: readonly Probe[]): Probe[] {
  const frequencies = probeFrequencies(model.nyquistFrequency);
  const end = (termination: Model['transmitter'] | Model['receiver']): Probe => ({
    reflections: Array.from(frequencies, (f) => {
      const { re, im } = terminationReflection(termination, model, f);
      return Math.hypot(re, im);
    }),
    transmissions: [1, 1, 1, 1],
    delaySeconds: 0,
  });
  return [end(model.transmitter), ...probes, end(model.receiver)];
}

/** Longest time that an echo takes to fall by 60 dB below the pulse: between two elements, from the middle of each, or inside one. */
function echoes(probes: readonly Probe[]): number {
  let longest = 0;
  const hear = (trip: number, seconds: number) => {
    if (trip <= decayed) return;
    const trips = Math.min(mostTrips, Math.log(decayed) / Math.log(Math.min(trip, 0.9999)));
    longest = Math.max(longest, 2 * seconds * trips);
  };
  for (let point = 0; point < 4; point++) {
    for (let i = 0; i < probes.length; i++) {
      const own = probes[i];
      // A mismatched segment shows up to the sum of its two ends.
      hear(((own.reflections[point] / 2) * own.transmissions[point]) ** 2, own.delaySeconds);
      let between = own.reflections[point];
      let delay = own.delaySeconds / 2;
      for (let j = i + 1; j < probes.length && between > decayed; j++) {
        const { reflections, transmissions, delaySeconds } = probes[j];
        hear(between * reflections[point], delay + delaySeconds / 2);
        between *= transmissions[point] ** 2;
        delay += delaySeconds;
      }
    }
  }
  return longest;
}

/**
 * The same measured on a computed response between its terminations: last instant at which the pulse is above 1/1000 of its peak.
 * Up to the symbol rate, where a symbol holds nothing: the instant is looked for, not the shape.
 * What lies in the last eighth of the window is taken as before time 0. A response that fills the window is at least that long.
 */
export function measuredDecay(model: Model, network: Network, grid: Grid): Decay {
  const pulse = inverseTransform(terminatedPulse(model, network, grid.frequencies.subarray(0, 2 ** grid.k + 1)));
  const sampleSeconds = 1 / (grid.stepHz * pulse.length);
  let peak = 0;
  for (let n = 1; n < pulse.length; n++) if (Math.abs(pulse[n]) > Math.abs(pulse[peak])) peak = n;
  let last = Math.floor((7 / 8) * pulse.length);
  while (last > peak && Math.abs(pulse[last]) < decayed * Math.abs(pulse[peak])) last--;
  return { delaySeconds: peak * sampleSeconds, decaySeconds: last * sampleSeconds };
}
