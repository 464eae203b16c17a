import type { Analysis } from '../analysis';
import type { Model } from '../model/types';
import type { Grid } from '../networks/types';
import type { Axis, PlotLimit } from './types';

/** Twice Nyquist, or three or four times where it takes that to show the lowest notch that has a name. */
export function frequencyEnd({ model: { nyquistFrequency }, cascade }: Analysis): number {
  const lowest = cascade?.resonances.find(({ elements }) => elements.length > 0)?.frequencyHz ?? 0;
  const multiple = [2, 3, 4].find((times) => lowest <= 0.95 * times * nyquistFrequency) ?? 2;
  return multiple * nyquistFrequency;
}

/** A function of frequency at the grid's points up to `endHz`. */
export function sampled(
  grid: Grid,
  endHz: number,
  value: (frequencyHz: number) => number,
): { x: Float64Array; y: Float64Array } {
  const count = Math.min(grid.points, Math.floor(endHz / grid.stepHz + 1e-9) + 1);
  const x = new Float64Array(count);
  const y = new Float64Array(count);
  for (let i = 0; i < count; i++) {
    x[i] = i * grid.stepHz;
    y[i] = value(x[i]);
  }
  return { x, y };
}

/** Room below the largest finite value, in steps that a small edit does not move. */
export function lossAxis(label: string, valuesDb: readonly number[], mostDb = 90): Axis {
  let largest = 0;
  for (const value of valuesDb) if (Number.isFinite(value)) largest = Math.max(largest, value);
  const step = largest < 4 ? 1 : largest < 20 ? 2 : 5;
  const end = Math.min(mostDb, Math.max(1, Math.ceil((largest * 1.04) / step) * step));
  return { label, unit: 'dB', domain: [0, end], downwards: true };
}

export const nyquistGuide = ({ nyquistFrequency }: Model) => [{ x: nyquistFrequency, label: 'Nyquist' }];

/** ` Limits: ball-to-ball met, mask not met.`; empty without limits. */
export function namesOf(limits: readonly PlotLimit[]): string {
  if (limits.length === 0) return '';
  return ` ${limits.length === 1 ? 'Limit' : 'Limits'}: ${limits.map(({ name, met }) => `${name} ${met ? 'met' : 'not met'}`).join(', ')}.`;
}
