import { straightThrough } from '../networks/through';
import type { Network, Networks } from '../networks/types';
import { chain } from './product';

/**
 * A piece of the path at any frequencies, computed anew from its elements, not taken from the grid.
 * @param frequencies Hz, in any order, 0 allowed
 * @param between positions in path, inclusive; all of path by default
 */
export function networkAt(networks: Networks, frequencies: Float64Array, between?: readonly [number, number]): Network {
  const context = { ...networks.context, frequencies };
  const [from, to] = between ?? [0, networks.elements.length - 1];
  let total: Network | undefined;
  for (const { through, evaluate } of networks.elements.slice(from, to + 1)) {
    if (through) continue;
    const network = evaluate(context);
    total = total ? chain(total, network) : network;
  }
  return total ?? straightThrough(context);
}
