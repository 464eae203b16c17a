import type { Model } from '../model/types';

/**
 * Magnitude of the transmitter's edge and the receiver's filter together, 1 at 0 Hz: the edge as two poles at 0.2365/rise time (check value
 * S-20), the filter a 4th-order Butterworth.
 */
export function endFilters({ symbolRate, transmitter, receiver }: Model): (frequencyHz: number) => number {
  const edgeHz = 0.2365 / (transmitter?.riseTimeSeconds ?? 0.25 / symbolRate);
  const filterHz = receiver?.bandwidthHz ?? 0.75 * symbolRate;
  return (f) => 1 / Math.sqrt((1 + (f / edgeHz) ** 4) * (1 + (f / filterHz) ** 8));
}

/**
 * Upper bound of the magnitude of what one symbol holds at a frequency, 1 at 0 Hz: the symbol's rectangle by its envelope
 * |sinc(f/fs)| ≤ fs/(πf), and the filters of both ends. Weighs what a channel does at frequencies where it matters little.
 */
export function pulseSpectrum(model: Model): (frequencyHz: number) => number {
  const filters = endFilters(model);
  return (f) => Math.min(1, model.symbolRate / (Math.PI * f)) * filters(f);
}

/** Share of the pulse spectrum's area that lies between two frequencies: a bound of what a cursor takes from there, by the main one. */
export function spectrumShare(model: Model, fromHz: number, toHz: number): number {
  const spectrum = pulseSpectrum(model);
  const whole = area(spectrum, 0, 16 * model.symbolRate);
  return whole > 0 ? area(spectrum, fromHz, toHz) / whole : 0;
}

/** Trapezoids, 256 of them: the envelope is smooth. */
function area(f: (x: number) => number, from: number, to: number): number {
  if (to <= from) return 0;
  const width = (to - from) / 256;
  let sum = (f(from) + f(to)) / 2;
  for (let i = 1; i < 256; i++) sum += f(from + i * width);
  return sum * width;
}
