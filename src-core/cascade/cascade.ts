import { straightThrough } from '../networks/through';
import type { Network, Networks } from '../networks/types';
import { type Chainer, keepProducts, type Products } from './product';
import { type KeptDips, keepDips, resonancesOf } from './resonances';
import type { Cascade } from './types';

/**
 * All elements in a chain, as a balanced tree of partial products. The tree's shape depends on the number of elements alone and
 * straight throughs are skipped, so that a kept product equals a computed one bit for bit; one element edited costs log2(n) products.
 * @param previous of which the partial products are taken; the same object comes back if no network changed
 */
export function cascadeOf(networks: Networks, previous?: Cascade): Cascade {
  const kept = previous?.kept as Kept | undefined;
  const factors = networks.elements.map(({ network, through }) => (through ? undefined : network));
  const names = networks.elements.map(({ element }) => element.name);
  if (previous && kept && same(kept.factors, factors) && same(kept.names, names)) return previous;
  const chainer = keepProducts(kept?.products);
  const dips = kept?.dips ?? keepDips();
  const through = straightThrough(networks.context);
  const total = treeProduct(factors, 0, factors.length, chainer) ?? through;
  const between = (from: number, to: number): Network => {
    if (from <= 0 && to >= factors.length - 1) return total;
    return rangeProduct(factors, { low: 0, high: factors.length }, from, to + 1, chainer) ?? through;
  };
  const products = chainer.computed();
  return {
    total,
    between,
    resonances: resonancesOf(networks, dips),
    kept: { factors, names, products: chainer.products, dips } satisfies Kept,
    products,
  };
}

interface Kept {
  readonly factors: readonly (Network | undefined)[];
  readonly names: readonly string[];
  readonly products: Products;
  readonly dips: KeptDips;
}

type Factors = readonly (Network | undefined)[];

/** Product of factors [low, high), by halves. */
function treeProduct(factors: Factors, low: number, high: number, chainer: Chainer): Network | undefined {
  if (high - low < 2) return factors[low];
  const middle = middleOf(low, high);
  return chainer.chain(treeProduct(factors, low, middle, chainer), treeProduct(factors, middle, high, chainer));
}

/** Product of factors [from, to) out of the tree's own nodes, at most two a level. */
function rangeProduct(
  factors: Factors,
  node: { readonly low: number; readonly high: number },
  from: number,
  to: number,
  chainer: Chainer,
): Network | undefined {
  const { low, high } = node;
  if (to <= low || high <= from) return undefined;
  if (from <= low && high <= to) return treeProduct(factors, low, high, chainer);
  const middle = middleOf(low, high);
  return chainer.chain(
    rangeProduct(factors, { low, high: middle }, from, to, chainer),
    rangeProduct(factors, { low: middle, high }, from, to, chainer),
  );
}

const middleOf = (low: number, high: number) => (low + high) >> 1;

const same = <T>(a: readonly T[], b: readonly T[]) => a.length === b.length && a.every((item, i) => item === b[i]);
