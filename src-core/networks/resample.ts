import type { TouchstoneData } from './touchstone-types';

/** Beyond the data's last frequency the response falls to nothing along a half cosine, until this multiple of that frequency. */
export const taperEnd = 1.5;

/**
 * A file's data at other frequencies. Each entry is turned back by its mean delay, so that what is left turns slowly, then:
 * - between the data's points, re and im by cubic Hermite pieces (tangents of the parabola through three neighbours), which pass through
 *   a notch's zero as smoothly as the response does;
 * - below the first point, the cubic that is even in re and odd in im about 0 Hz, as the spectrum of a real response is: real at DC,
 *   and no larger than the data beside it or 1;
 * - above the last point, its last value and mean delay go on under a half cosine that ends at 1.5 times the last frequency.
 *   Scaling a whole matrix keeps it passive.
 * @param frequencies Hz, in any order, 0 allowed
 * @returns 2n² numbers a frequency, in the data's reference
 */
export function resample(
  { ports, frequencies: known, s }: Pick<TouchstoneData, 'ports' | 'frequencies' | 's'>,
  frequencies: Float64Array,
): Float64Array {
  const stride = 2 * ports * ports;
  const out = new Float64Array(stride * frequencies.length);
  const spots = Array.from(frequencies, (f) => spotOf(known, f));
  for (let entry = 0; entry < stride; entry += 2) {
    const delay = meanDelay(known, s, entry, stride);
    const turned = turnedBack(known, s, entry, stride, delay);
    const tangents = tangentsOf(known, turned);
    for (let i = 0; i < frequencies.length; i++) {
      const { re, im } = valueAt(known, turned, tangents, spots[i], frequencies[i]);
      const angle = -2 * Math.PI * frequencies[i] * delay;
      const c = Math.cos(angle);
      const d = Math.sin(angle);
      out[i * stride + entry] = re * c - im * d;
      out[i * stride + entry + 1] = frequencies[i] === 0 ? 0 : re * d + im * c;
    }
  }
  return out;
}

/** Mean delay of one entry, seconds: its turning between neighbours, weighed by their sizes. */
export function meanDelay(known: Float64Array, s: Float64Array, entry: number, stride: number): number {
  let turning = 0;
  let width = 0;
  for (let i = 1; i < known.length; i++) {
    const a = (i - 1) * stride + entry;
    const b = i * stride + entry;
    const re = s[a] * s[b] + s[a + 1] * s[b + 1];
    const im = s[a] * s[b + 1] - s[a + 1] * s[b];
    const weight = Math.hypot(re, im);
    turning += weight * Math.atan2(im, re);
    width += weight * (known[i] - known[i - 1]);
  }
  return width > 0 ? -turning / (2 * Math.PI * width) : 0;
}

/** Index of the last known frequency not above f; -1 below the first. */
function spotOf(known: Float64Array, f: number): number {
  let low = -1;
  let high = known.length;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (known[middle] <= f) low = middle;
    else high = middle;
  }
  return low;
}

function turnedBack(known: Float64Array, s: Float64Array, entry: number, stride: number, delay: number): Float64Array {
  const out = new Float64Array(2 * known.length);
  for (let i = 0; i < known.length; i++) {
    const angle = 2 * Math.PI * known[i] * delay;
    const c = Math.cos(angle);
    const d = Math.sin(angle);
    const [re, im] = [s[i * stride + entry], s[i * stride + entry + 1]];
    out[2 * i] = re * c - im * d;
    out[2 * i + 1] = known[i] === 0 ? 0 : re * d + im * c;
  }
  return out;
}

/** Slopes at the known points, re and im; at the first point that of the chord to twice its frequency, which reaches down to DC. */
function tangentsOf(known: Float64Array, turned: Float64Array): Float64Array {
  const n = known.length;
  const out = new Float64Array(2 * n);
  if (n < 2) return out;
  const chord = (i: number, k: number, part: number) =>
    (turned[2 * k + part] - turned[2 * i + part]) / (known[k] - known[i]);
  let second = 1;
  while (second < n - 1 && known[second] < 2 * known[0]) second++;
  for (let part = 0; part < 2; part++) {
    out[part] = known[0] > 0 ? chord(0, second, part) : part === 0 ? 0 : chord(0, 1, part);
    for (let i = 1; i < n - 1; i++) {
      const before = known[i] - known[i - 1];
      const after = known[i + 1] - known[i];
      out[2 * i + part] = (chord(i - 1, i, part) * after + chord(i, i + 1, part) * before) / (before + after);
    }
    out[2 * (n - 1) + part] = chord(n - 2, n - 1, part);
  }
  return out;
}

function valueAt(
  known: Float64Array,
  turned: Float64Array,
  tangents: Float64Array,
  spot: number,
  f: number,
): { re: number; im: number } {
  const last = known.length - 1;
  if (spot < 0) return belowFirst(known, turned, tangents, f);
  if (spot === last) {
    const taper = taperAt(f / known[last]);
    return { re: turned[2 * last] * taper, im: turned[2 * last + 1] * taper };
  }
  const width = known[spot + 1] - known[spot];
  const t = (f - known[spot]) / width;
  const part = (k: number) =>
    hermite(
      t,
      width,
      turned[2 * spot + k],
      turned[2 * spot + 2 + k],
      tangents[2 * spot + k],
      tangents[2 * spot + 2 + k],
    );
  return { re: part(0), im: part(1) };
}

/** From −f0 to f0, the value at −f0 being the conjugate of that at f0. */
function belowFirst(
  known: Float64Array,
  turned: Float64Array,
  tangents: Float64Array,
  f: number,
): { re: number; im: number } {
  const width = 2 * known[0];
  const t = (f + known[0]) / width;
  const re = hermite(t, width, turned[0], turned[0], -tangents[0], tangents[0]);
  const im = hermite(t, width, -turned[1], turned[1], tangents[1], tangents[1]);
  const most = Math.max(1, Math.hypot(turned[0], turned[1]));
  const size = Math.hypot(re, im);
  return size > most ? { re: (re * most) / size, im: (im * most) / size } : { re, im };
}

function hermite(t: number, width: number, from: number, to: number, slopeFrom: number, slopeTo: number): number {
  const u = 1 - t;
  return u * u * ((1 + 2 * t) * from + t * width * slopeFrom) + t * t * ((1 + 2 * u) * to - u * width * slopeTo);
}

/** @param ratio frequency over the last known one */
function taperAt(ratio: number): number {
  if (!(ratio > 1)) return 1;
  return ratio >= taperEnd ? 0 : 0.5 * (1 + Math.cos((Math.PI * (ratio - 1)) / (taperEnd - 1)));
}
