import { elementKinds } from '../elements/index';
import type { AnyElement, Model } from '../model/types';
import type { Prepared } from '../networks/types';
import type { Judged } from './types';

/** The same element with other values; what a fix would write, without a text. */
export const changed = (element: AnyElement, values: Record<string, unknown>): AnyElement =>
  ({ ...element, values: { ...element.values, ...values } }) as AnyElement;

/** The channel with one element changed. */
export const modelWith = (model: Model, element: AnyElement): Model => ({
  ...model,
  elements: model.elements.map((one) => (one.index === element.index ? element : one)),
});

/** What would be known of a changed element, its network apart: cheap. undefined where that needs what is not at hand. */
export function prepareChanged({ model }: Judged, element: AnyElement): Prepared | undefined {
  return elementKinds[element.kind].prepare(element, { model: modelWith(model, element), touchstone: () => undefined });
}
