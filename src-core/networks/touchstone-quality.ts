import { largestSingularValue, singularValueBound } from './singular-value';
import type { TouchstoneData, TouchstoneQuality } from './touchstone-types';

/** Thresholds and scales of the standard's initial figures. */
const passive = { threshold: 1.00001, scale: 0.1 };
const reciprocal = { threshold: 1e-6, scale: 0.1 };

/**
 * How well a file obeys what every network of passive parts obeys: passive, reciprocal, causal. Measured, never mended.
 * Source: the initial quality figures of IEEE 370-2020. Check values F-15 to F-17.
 */
export function touchstoneQuality({
  ports,
  frequencies,
  s,
}: Pick<TouchstoneData, 'ports' | 'frequencies' | 's'>): TouchstoneQuality {
  const size = 2 * ports * ports;
  let gain = 0;
  let gainHz = 0;
  let difference = 0;
  let differenceHz = 0;
  let passivityLost = 0;
  let reciprocityLost = 0;
  for (let i = 0; i < frequencies.length; i++) {
    const bound = singularValueBound(s, ports, i * size);
    if (bound > gain || bound > passive.threshold) {
      const value = largestSingularValue(s, ports, i * size);
      if (value > gain) [gain, gainHz] = [value, frequencies[i]];
      passivityLost += Math.max(0, value - passive.threshold) / passive.scale;
    }
    const { largest, mean } = nonReciprocity(s, ports, i * size);
    if (largest > difference) [difference, differenceHz] = [largest, frequencies[i]];
    reciprocityLost += Math.max(0, mean - reciprocal.threshold) / reciprocal.scale;
  }
  const percent = (lost: number) => Math.max(0, 100 * (1 - lost / frequencies.length));
  return {
    largestSingularValue: gain,
    worstPassivityHz: gainHz,
    largestNonReciprocity: difference,
    worstReciprocityHz: differenceHz,
    passivityPercent: percent(passivityLost),
    reciprocityPercent: percent(reciprocityLost),
    causalityPercent: causalityPercent(s, ports, frequencies.length),
  };
}

/** Largest |Sij − Sji|, and their mean over all ordered pairs. */
function nonReciprocity(s: Float64Array, n: number, at: number): { largest: number; mean: number } {
  let largest = 0;
  let sum = 0;
  for (let row = 0; row < n; row++) {
    for (let column = row + 1; column < n; column++) {
      const i = at + 2 * (row * n + column);
      const j = at + 2 * (column * n + row);
      const size = Math.hypot(s[i] - s[j], s[i + 1] - s[j + 1]);
      largest = Math.max(largest, size);
      sum += 2 * size;
    }
  }
  return { largest, mean: n > 1 ? sum / (n * (n - 1)) : 0 };
}

/** Worst entry's share of clockwise turning: of what delays, the plot in the complex plane turns clockwise with frequency. */
function causalityPercent(s: Float64Array, n: number, points: number): number {
  let worst = 100;
  for (let entry = 0; entry < n * n; entry++)
    worst = Math.min(worst, clockwisePercent(s, 2 * entry, 2 * n * n, points));
  return worst;
}

export function clockwisePercent(s: Float64Array, offset: number, stride: number, points: number): number {
  let clockwise = 0;
  let whole = 0;
  for (let i = 1; i + 1 < points; i++) {
    const at = offset + i * stride;
    const cross =
      (s[at] - s[at - stride]) * (s[at + stride + 1] - s[at + 1]) -
      (s[at + 1] - s[at - stride + 1]) * (s[at + stride] - s[at]);
    if (cross < 0) clockwise -= cross;
    whole += Math.abs(cross);
  }
  // An entry that does not move (an ideal match) turns nowhere and is causal.
  return whole < 1e-18 ? 100 : (100 * clockwise) / whole;
}
