import { measuresOf } from '../figures/element-measures';
import { insertionLossAt } from '../figures/measures';
import type { AnyElement, Limit } from '../model/types';
import type { ElementNetwork } from '../networks/types';
import { show } from '../quantity/show';
import type { Judged } from './types';

/** The elements that a limit judges, in order. */
export function elementsWithin({ networks }: Judged, limit: Pick<Limit, 'between'>): readonly ElementNetwork[] {
  const [first, last] = limit.between ?? [0, networks!.elements.length - 1];
  return networks!.elements.slice(first, last + 1).filter(({ through }) => !through);
}

/**
 * The element whose own loss at a frequency exceeds its fair share the most: its budget where it has one, else its part of what is
 * allowed by its part of the delay. An element that loses little is never named, long or short.
 * @returns undefined where no element spends more than its share (reflections between them do)
 */
export function spendsMost(judged: Judged, limit: Pick<Limit, 'between'>, allowedDb: number, atHz: number) {
  const grid = judged.networks!.grid;
  const elements = elementsWithin(judged, limit);
  const delays = elements.map((element) =>
    Math.max(0, measuresOf(element, grid, judged.model.nyquistFrequency).delaySeconds),
  );
  const whole = delays.reduce((sum, delay) => sum + delay, 0);
  let most: { element: AnyElement; spentDb: number; overDb: number } | undefined;
  elements.forEach(({ element, network }, i) => {
    const spentDb = insertionLossAt(network.differential, grid, atHz);
    const shareDb =
      element.budget?.value ?? (whole > 0 ? (allowedDb * delays[i]) / whole : allowedDb / elements.length);
    const overDb = spentDb - shareDb;
    if (overDb > (most?.overDb ?? 0)) most = { element, spentDb, overDb };
  });
  if (!most) return undefined;
  const { element, spentDb, overDb } = most as { element: AnyElement; spentDb: number; overDb: number };
  const share = element.budget ? 'its budget' : 'its share by delay';
  return {
    element,
    message: `\`${element.name}\` spends the most over its share: ${show.loss(spentDb)}, ${show.loss(overDb)} over ${share}.`,
  };
}
