import type { ElementValues, Quantity } from '../../schemas/format/types';
import type { AnyElement, Model } from '../model/types';
import type { ElementNote } from '../networks/types';
import { SPEED_OF_LIGHT } from '../physics/constants';

/** Keys that every element with a line in it takes. */
export type LineValues = Partial<ElementValues['trace']>;

export const isPair = (model: Model) => model.signalling !== 'single-ended';

/** Both ends of a quantity's tolerance, lower first. */
export const endsOf = ({ value, plus, minus }: Quantity): readonly [number, number] => [value - minus, value + plus];

export const hasTolerance = (quantity: Quantity | undefined) =>
  quantity !== undefined && (quantity.plus > 0 || quantity.minus > 0);

/** Frequency of `@`; undefined where none is written (or `@ nyquist`, which is an error in an element's own data). */
export const frequencyOf = (quantity: Quantity | undefined) =>
  typeof quantity?.at === 'number' && quantity.at > 0 ? quantity.at : undefined;

/** Delay per metre as written by `delay`, `velocity` or `dk`. */
export function writtenDelay({
  delay,
  velocity,
  dk,
}: Pick<LineValues, 'delay' | 'velocity' | 'dk'>): number | undefined {
  if (delay) return delay.value;
  if (velocity) return 1 / velocity.value;
  return dk && Math.sqrt(dk.value) / SPEED_OF_LIGHT;
}

/** Loss points in dB and Hz; a point without a frequency holds at Nyquist (its finding is another's). */
export const lossPoints = (loss: readonly Quantity[], model: Model, times = 1) =>
  loss.map((point) => ({ db: point.value * times, hz: frequencyOf(point) ?? model.nyquistFrequency }));

/** Share of a one-point loss that follows √f: conductors lose more than laminates in cables, as much elsewhere. Common practice. */
export const SKIN_SHARE = { trace: 0.5, package: 0.5, cable: 0.8, connector: 0.5 } as const;

/** A note of the rule `model-range`: an estimate whose model does not hold here. */
export const rangeNote = (element: AnyElement, message: string, key?: string): ElementNote => ({
  rule: 'model-range',
  at: (key !== undefined && element.places[key]) || element.place,
  message,
});
