import type { Model } from '../model/types';
import { endFilters } from './pulse-spectrum';
import type { Network } from './types';

type Termination = { readonly impedanceOhms: number; readonly capacitanceFarads: number };

/** Reflection of a termination with its capacitance at each leg, seen from the reference (differential; single-ended: of the conductor). */
export function terminationReflection(termination: Termination | undefined, model: Model, frequencyHz: number) {
  if (!termination) return { re: 0, im: 0 };
  const { referenceOhms, signalling } = model;
  const legOhms = signalling === 'single-ended' ? referenceOhms : referenceOhms / 2;
  const g = referenceOhms / termination.impedanceOhms;
  const b = 2 * Math.PI * frequencyHz * termination.capacitanceFarads * legOhms;
  const scale = 1 / ((1 + g) ** 2 + b * b);
  return { re: ((1 - g) * (1 + g) - b * b) * scale, im: -2 * b * scale };
}

/**
 * Spectrum of a symbol's pulse behind a network between its terminations and the filters of both ends, at frequencies up to the symbol rate.
 * H = s21 / ((1 − s11 Γs)(1 − s22 Γl) − s12 s21 Γs Γl); what does not change over frequency is left out.
 * @returns re and im in turn
 */
export function terminatedPulse(model: Model, { differential: s }: Network, frequencies: Float64Array): Float64Array {
  const filters = endFilters(model);
  const spectrum = new Float64Array(2 * frequencies.length);
  for (let i = 0; i < frequencies.length; i++) {
    const f = frequencies[i];
    const at = 8 * i;
    const source = terminationReflection(model.transmitter, model, f);
    const load = terminationReflection(model.receiver, model, f);
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
    const scale = (sinc(f / model.symbolRate) * filters(f)) / Math.max(dr * dr + di * di, 1e-12);
    spectrum[2 * i] = (s[at + 4] * dr + s[at + 5] * di) * scale;
    spectrum[2 * i + 1] = (s[at + 5] * dr - s[at + 4] * di) * scale;
  }
  return spectrum;
}

const sinc = (x: number) => (x === 0 ? 1 : Math.sin(Math.PI * x) / (Math.PI * x));
