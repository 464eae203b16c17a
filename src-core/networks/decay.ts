import type { Model } from '../model/types';
import type { Decay } from './grid';
import { inverseTransform } from './inverse-transform';
import { pulseSpectrum } from './pulse-spectrum';
import type { ElementFacts, Grid, Network } from './types';

/** The decay that the estimate looks for: 60 dB, an amplitude of 1/1000. */
const decayed = 1e-3;
/** A round trip without loss would ring for ever; more trips than this are counted as a grid that does not suffice. */
const mostTrips = 1000;

/** Of one element, at the frequencies of `probeFrequencies`. */
export interface Probe {
  /** Largest |s11| or |s22|. */
  readonly reflection: number;
  /** Largest |s21|. */
  readonly transmission: number;
  readonly delaySeconds: number;
  /** Losses at Nyquist / 4 and at Nyquist, nepers. */
  readonly lossQuarter: number;
  readonly lossNyquist: number;
}

/** Where elements are probed: an eighth, a quarter, a half and the whole of Nyquist. */
export const probeFrequencies = (nyquist: number) => Float64Array.of(nyquist / 8, nyquist / 4, nyquist / 2, nyquist);

export function probeOf({ differential: s }: Network, facts: ElementFacts | undefined, nyquist: number): Probe {
  let reflection = 0;
  let transmission = 0;
  for (let at = 0; at < s.length; at += 8) {
    reflection = Math.max(reflection, Math.hypot(s[at], s[at + 1]), Math.hypot(s[at + 6], s[at + 7]));
    transmission = Math.max(transmission, Math.hypot(s[at + 4], s[at + 5]));
  }
  const loss = (point: number) =>
    -Math.log(Math.min(1, Math.max(1e-6, Math.hypot(s[8 * point + 4], s[8 * point + 5]))));
  const phase = -Math.atan2(s[5], s[4]);
  return {
    reflection: Math.min(1, reflection),
    transmission: Math.min(1, transmission),
    delaySeconds: facts?.delaySeconds ?? Math.max(0, phase) / (2 * Math.PI * (nyquist / 8)),
    lossQuarter: loss(1),
    lossNyquist: loss(3),
  };
}

/**
 * Estimate of the time in which the channel's pulse response decays by 60 dB, from its elements alone: their delays, the diffusion tail
 * of their skin effect, and the echoes between each two of them, ends of the channel included.
 * Holds within a factor of about two; `measuredDecay` checks it on the computed response.
 */
export function estimatedDecay(model: Model, probes: readonly Probe[]): Decay {
  const delaySeconds = probes.reduce((sum, probe) => sum + probe.delaySeconds, 0);
  const settle = Math.max(skinTail(model, probes), echoes([...endsOf(model, probes)]));
  return { delaySeconds, decaySeconds: delaySeconds + 3 * model.unitInterval + settle };
}

/**
 * Skin loss of a nepers at Nyquist has the impulse response k/(2√π) t^(-3/2) exp(−k²/4t), k = a/√(π f_Nyquist); a symbol's tail
 * is a unit interval of it. Source: Wigington and Nahman, Proc. IRE 45, 1957, 166-174.
 */
function skinTail({ nyquistFrequency, unitInterval }: Model, probes: readonly Probe[]): number {
  let quarter = 0;
  let whole = 0;
  for (const probe of probes) {
    quarter += probe.lossQuarter;
    whole += probe.lossNyquist;
  }
  const skin = Math.max(0, Math.min(whole, 4 * quarter - whole)); // the a of a√x + bx through x = 1/4 and 1
  const main = Math.min(0.8, Math.max(0.02, Math.exp(-(quarter + whole) / 2)));
  const k = skin / Math.sqrt(Math.PI * nyquistFrequency);
  return ((k * unitInterval) / (2 * Math.sqrt(Math.PI) * decayed * main)) ** (2 / 3);
}

/** The elements between what the two ends reflect at Nyquist. */
function endsOf(model: Model, probes: readonly Probe[]): Probe[] {
  const end = (termination: Termination | undefined): Probe => {
    const { re, im } = terminationReflection(termination, model, model.nyquistFrequency);
    return { reflection: Math.hypot(re, im), transmission: 1, delaySeconds: 0, lossQuarter: 0, lossNyquist: 0 };
  };
  return [end(model.transmitter), ...probes, end(model.receiver)];
}

/** Longest time that an echo between two elements takes to fall by 60 dB below the pulse. */
function echoes(probes: readonly Probe[]): number {
  let longest = 0;
  for (let i = 0; i < probes.length; i++) {
    let between = 1;
    let delay = probes[i].delaySeconds;
    for (let j = i + 1; j < probes.length; j++) {
      delay += probes[j].delaySeconds;
      const trip = probes[i].reflection * probes[j].reflection * between;
      if (trip > decayed)
        longest = Math.max(
          longest,
          2 * delay * Math.min(mostTrips, Math.log(decayed) / Math.log(Math.min(trip, 0.9999))),
        );
      between *= probes[j].transmission ** 2;
      if (between < decayed) break;
    }
  }
  return longest;
}

type Termination = { readonly impedanceOhms: number; readonly capacitanceFarads: number };

/** Reflection of a termination with its capacitance at each leg, seen from the reference (differential; single-ended: of the conductor). */
function terminationReflection(termination: Termination | undefined, model: Model, frequencyHz: number) {
  if (!termination) return { re: 0, im: 0 };
  const { referenceOhms, signalling } = model;
  const legOhms = signalling === 'single-ended' ? referenceOhms : referenceOhms / 2;
  const g = referenceOhms / termination.impedanceOhms;
  const b = 2 * Math.PI * frequencyHz * termination.capacitanceFarads * legOhms;
  const scale = 1 / ((1 + g) ** 2 + b * b);
  return { re: ((1 - g) * (1 + g) - b * b) * scale, im: -2 * b * scale };
}

/**
 * The same measured on a computed response between its terminations: last instant at which the pulse is above 1/1000 of its peak.
 * What lies in the last eighth of the window is taken as before time 0. A response that fills the window is at least that long.
 */
export function measuredDecay(model: Model, { differential: s }: Network, grid: Grid): Decay {
  const weight = pulseSpectrum(model);
  const spectrum = new Float64Array(2 * grid.points);
  for (let i = 0; i < grid.points; i++) {
    const f = grid.frequencies[i];
    const at = 8 * i;
    const source = terminationReflection(model.transmitter, model, f);
    const load = terminationReflection(model.receiver, model, f);
    // H = s21 / ((1 − s11 Γs)(1 − s22 Γl) − s12 s21 Γs Γl)
    const pr = 1 - (s[at] * source.re - s[at + 1] * source.im);
    const pi = -(s[at] * source.im + s[at + 1] * source.re);
    const qr = 1 - (s[at + 6] * load.re - s[at + 7] * load.im);
    const qi = -(s[at + 6] * load.im + s[at + 7] * load.re);
    const gr = source.re * load.re - source.im * load.im;
    const gi = source.re * load.im + source.im * load.re;
    const tr = s[at + 2] * s[at + 4] - s[at + 3] * s[at + 5];
    const ti = s[at + 2] * s[at + 5] + s[at + 3] * s[at + 4];
    const dr = pr * qr - pi * qi - (tr * gr - ti * gi);
    const di = pr * qi + pi * qr - (tr * gi + ti * gr);
    const scale = weight(f) / Math.max(dr * dr + di * di, 1e-12);
    spectrum[2 * i] = (s[at + 4] * dr + s[at + 5] * di) * scale;
    spectrum[2 * i + 1] = (s[at + 5] * dr - s[at + 4] * di) * scale;
  }
  const pulse = inverseTransform(spectrum);
  const sampleSeconds = 1 / (grid.stepHz * pulse.length);
  let peak = 0;
  for (let n = 1; n < pulse.length; n++) if (Math.abs(pulse[n]) > Math.abs(pulse[peak])) peak = n;
  let last = Math.floor((7 / 8) * pulse.length);
  while (last > peak && Math.abs(pulse[last]) < decayed * Math.abs(pulse[peak])) last--;
  return { delaySeconds: peak * sampleSeconds, decaySeconds: last * sampleSeconds };
}
