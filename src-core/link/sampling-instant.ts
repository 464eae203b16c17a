import { valueAt } from './resample';

/** The first DFE tap counts for timing up to this share of the main cursor, however much it may correct. */
const mostForTiming = 0.5;
/** An instant at which the response is below this share of its peak is no sampling instant. */
const leastHeight = 0.5;

/**
 * Where the slicer samples, in samples of the record: the main cursor's place.
 *
 * The clock settles where the first precursor equals what the DFE leaves of the first postcursor:
 * h(t - 1) = h(t + 1) - b h(t), b = h(t + 1)/h(t) within ± the DFE's limit. If several, the first before the peak, looking back from it; if
 * none before, the first after it; if none within a UI at half the peak's height or more, the peak.
 * Ours: the limit counts up to 0.5 here, else an unlimited DFE would drag the clock down the rising edge.
 * Source: IEEE 802.3 Annex 93A, sampling rule. Check value E-11.
 * @param pulse periodic; its largest value is positive
 * @param firstTapLimit 0 without a DFE
 * @param peak index of the largest value
 */
export function samplingInstant(
  pulse: Float64Array,
  samplesPerUi: number,
  firstTapLimit: number,
  peak = peakOf(pulse),
): number {
  const limit = Math.min(firstTapLimit, mostForTiming);
  const n = pulse.length;
  const sampleAt = (place: number) => pulse[((place % n) + n) % n];
  const balance = (value: (place: number) => number) => (place: number) => {
    const main = value(place);
    const post = value(place + samplesPerUi);
    const corrected = Math.max(-limit * Math.abs(main), Math.min(limit * Math.abs(main), post));
    return value(place - samplesPerUi) - (post - corrected);
  };
  const coarse = balance(sampleAt);
  const fine = balance((place) => valueAt(pulse, place));
  const least = leastHeight * pulse[peak];
  if (coarse(peak) === 0) return peak;
  for (const direction of [-1, 1]) {
    let before = coarse(peak);
    for (let step = 1; step <= samplesPerUi; step++) {
      const place = peak + direction * step;
      if (sampleAt(place) < least) break;
      const here = coarse(place);
      if (here === 0) return place;
      if (before * here < 0) return root(fine, place - direction, place);
      before = here;
    }
  }
  return peak;
}

function peakOf(record: Float64Array): number {
  let peak = 0;
  for (let i = 1; i < record.length; i++) if (record[i] > record[peak]) peak = i;
  return peak;
}

/** Halves the interval between two places of unlike sign until a millionth of a sample is left. */
function root(f: (place: number) => number, from: number, to: number): number {
  let [a, b] = [from, to];
  const sign = Math.sign(f(a));
  while (Math.abs(b - a) > 1e-7) {
    const middle = (a + b) / 2;
    if (Math.sign(f(middle)) === sign) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}
