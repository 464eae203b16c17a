import { fullOf, networkOf } from '../networks/mixed-mode';
import type { Network } from '../networks/types';
import { starTwoPort } from './star';
import { starFourPort } from './star-four-port';

/**
 * Two networks in a chain, `a` on the transmitter's side. Modes that do not convert stay two separate chains; the first element
 * that converts makes the product a four-port.
 */
export function chain(a: Network, b: Network): Network {
  if (a.full || b.full) return networkOf(starFourPort(fullOf(a), fullOf(b)));
  const differential = starTwoPort(a.differential, b.differential);
  if (!a.common || !b.common) return { differential };
  // Uncoupled legs hold one array for both modes: so does their product.
  if (a.common === a.differential && b.common === b.differential) return { differential, common: differential };
  return { differential, common: starTwoPort(a.common, b.common) };
}

/** Products by their two factors. An entry lives as long as both factors do, so that nothing has to be thrown out. */
export type Products = WeakMap<Network, WeakMap<Network, Network>>;

/** Chains networks, each pair once. */
export interface Chainer {
  /** `undefined` is a straight through, which leaves the other factor as it is. */
  chain(a: Network | undefined, b: Network | undefined): Network | undefined;
  readonly products: Products;
  computed(): number;
}

export function keepProducts(products: Products = new WeakMap()): Chainer {
  let computed = 0;
  return {
    products,
    computed: () => computed,
    chain(a, b) {
      if (!a || !b) return a ?? b;
      let ofFirst = products.get(a);
      if (!ofFirst) products.set(a, (ofFirst = new WeakMap()));
      let product = ofFirst.get(b);
      if (!product) {
        ofFirst.set(b, (product = chain(a, b)));
        computed++;
      }
      return product;
    },
  };
}
