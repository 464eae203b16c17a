import type { Model } from '../model/types';
import { fftOf } from '../networks/inverse-transform';
import { terminatedPulse } from '../networks/terminated-pulse';
import type { Network, Networks } from '../networks/types';
import { networkAt } from './network-at';

/** The golden ratio's lesser part: of no small multiple is it near a whole number, so that no echo hides. */
const offset = (3 - Math.sqrt(5)) / 2;
/** |1 − e^{-j2πqm}| is 1.86, 1.35, 0.88, 1.99 for m of 1 to 4. */
const usualChange = Math.SQRT2;

/**
 * What folds back into a window that is too short for the response, by the main cursor. Frequencies i·Δ give the pulse with all that comes
 * later than 1/Δ laid over it; the same step from another start, (i + q)·Δ, turns what is m windows late by e^{-j2πqm}. Turned so that the
 * main cursors agree, the two differ by what folds. Taken of the analytic signal, whose size is the pulse's envelope.
 * Within a factor of about 1.6 for echoes up to four windows late, mostly too much; cannot tell less than about 2e-4.
 * Costs each network once more, for channels that 16,384 points do not hold.
 */
export function remainingError(model: Model, networks: Networks, total: Network): number {
  const { grid } = networks;
  const points = 2 ** grid.k;
  const moved = Float64Array.from({ length: points }, (_, i) => (i + offset) * grid.stepHz);
  const here = folded(terminatedPulse(model, total, grid.frequencies.subarray(0, points)), 0);
  const there = folded(terminatedPulse(model, networkAt(networks, moved), moved), offset);
  let peak = 0;
  for (let n = 2; n < here.length; n += 2) if (Math.abs(here[n]) > Math.abs(here[peak])) peak = n;
  const main = Math.abs(here[peak]);
  if (!(main > 0)) return 0;
  const [re, im] = turnBetween(here, there, peak);
  let most = 0;
  for (let n = 0; n < here.length; n += 2) {
    const turned = [there[n] * re - there[n + 1] * im, there[n] * im + there[n + 1] * re];
    most = Math.max(most, Math.hypot(here[n] - turned[0], here[n + 1] - turned[1]));
  }
  return Math.min(1, most / usualChange / main);
}

/** The unit number that turns `there` to `here` at one sample. */
function turnBetween(here: Float64Array, there: Float64Array, n: number): readonly [number, number] {
  const re = here[n] * there[n] + here[n + 1] * there[n + 1];
  const im = here[n + 1] * there[n] - here[n] * there[n + 1];
  const size = Math.hypot(re, im) || 1;
  return [re / size, im / size];
}

/** Sum over (i + start)·Δ at two samples of each point, re and im in turn. */
function folded(spectrum: Float64Array, start: number): Float64Array {
  const samples = spectrum.length;
  const fft = fftOf(samples);
  const whole = new Float64Array(2 * samples);
  whole.set(spectrum);
  if (start === 0) for (const i of [0, 1]) whole[i] /= 2;
  const out = new Float64Array(2 * samples);
  fft.inverseTransform(out, whole);
  for (let n = 0; n < samples; n++) {
    const angle = (2 * Math.PI * start * n) / samples;
    const [re, im] = [out[2 * n], out[2 * n + 1]];
    out[2 * n] = re * Math.cos(angle) - im * Math.sin(angle);
    out[2 * n + 1] = re * Math.sin(angle) + im * Math.cos(angle);
  }
  return out;
}
