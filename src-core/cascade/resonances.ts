import type { ElementNetwork, Network, NetworkContext, Networks } from '../networks/types';
import { lossDb, type OwnDip, ownDips } from './own-dips';
import { chain } from './product';
import type { Resonance } from './types';

/** Dips of two elements that lie this near are alike: both make what is seen. */
const alike = 0.02;
/** No real part is sharper; a stub without any loss would be infinitely so. */
const mostQuality = 1e4;
/** What the elements add to the channel's loss there for it to be called theirs, dB. */
const leastDepthDb = 1;
const mostDipsKept = 16;
/** Where a dip is looked at: its own frequency and, to either side, these shares of it, closer and closer. */
const offsets = Array.from({ length: 25 }, (_, i) => 0.5 * 10 ** (-i / 4));

/** What was found out about networks that are still the same, by network: own dips, and their values around a dip. */
export interface KeptDips {
  readonly own: WeakMap<Network, readonly OwnDip[]>;
  readonly around: WeakMap<Network, Map<number, Network>>;
}

export const keepDips = (): KeptDips => ({ own: new WeakMap(), around: new WeakMap() });

/**
 * Resonances of the channel: where its differential transmission has a dip that an element makes, lowest first.
 * Each element's own dips are refined on the element itself; then the whole path is evaluated around them, once as it is and once with
 * the elements that have the dip replaced by a straight through. What those add to the loss there is the depth, at least 1 dB;
 * so a lossy line is blamed for nothing, and a stub's dip that others drown is not listed. Dips of two elements within 2 % are named as one, with both.
 * A dip that two mismatches make between them is no element's and is not listed.
 * Q is the dip's frequency over the width in which those elements add more than 3 dB less than at its bottom, or more than half of it
 * where that is less than 6 dB; at most 10,000.
 */
export function resonancesOf(networks: Networks, kept: KeptDips = keepDips()): readonly Resonance[] {
  const dips = networks.elements.flatMap((element, index) =>
    element.through ? [] : keptOwnDips(element, networks, kept).map((dip) => ({ ...dip, index })),
  );
  dips.sort((a, b) => a.frequencyHz - b.frequencyHz);
  const resonances: Resonance[] = [];
  for (let first = 0; first < dips.length; ) {
    let end = first + 1;
    while (end < dips.length && dips[end].frequencyHz <= dips[first].frequencyHz * (1 + alike)) end++;
    const resonance = resonanceOf(networks, dips.slice(first, end), kept);
    if (resonance) resonances.push(resonance);
    first = end;
  }
  return resonances;
}

type Dip = OwnDip & { readonly index: number };

function keptOwnDips(element: ElementNetwork, { context }: Networks, { own }: KeptDips): readonly OwnDip[] {
  let found = own.get(element.network);
  if (!found) own.set(element.network, (found = ownDips(element, context)));
  return found;
}

/** The dip that one element, or several alike, make in the whole path; undefined where it does not show there. */
function resonanceOf(networks: Networks, dips: readonly Dip[], { around }: KeptDips): Resonance | undefined {
  const deepest = dips.reduce((a, b) => (b.depthDb > a.depthDb ? b : a));
  const centre = deepest.frequencyHz;
  const frequencies = Float64Array.from(
    [...offsets.map((o) => 1 - o), 1, ...offsets.map((o) => 1 + o).reverse()],
    (share) => share * centre,
  );
  const makers = new Set(dips.map(({ index }) => index));
  const near = networks.elements.map((element) =>
    element.through ? undefined : keptAround(element, centre, { ...networks.context, frequencies }, around),
  );
  const whole = lossesOf(near, frequencies);
  const without = lossesOf(
    near.map((network, i) => (makers.has(i) ? undefined : network)),
    frequencies,
  );
  const added = whole.map((loss, i) => loss - without[i]);
  const bottom = bottomNear(added, offsets.length);
  if (added[bottom] < leastDepthDb) return undefined;
  const names = [...makers].sort((a, b) => a - b).map((index) => networks.elements[index].element.name);
  return {
    frequencyHz: frequencies[bottom],
    depthDb: added[bottom],
    lossDb: whole[bottom],
    quality: frequencies[bottom] / widthOf(frequencies, added, bottom),
    elements: names,
  };
}

/** An element's values around a dip, which an edit of another element leaves as they are. The last few dips alone are held. */
function keptAround(
  { network, evaluate }: ElementNetwork,
  centre: number,
  context: NetworkContext,
  kept: KeptDips['around'],
): Network {
  let byCentre = kept.get(network);
  if (!byCentre) kept.set(network, (byCentre = new Map()));
  let found = byCentre.get(centre);
  if (!found) {
    found = evaluate(context);
    if (byCentre.size >= mostDipsKept) byCentre.delete(byCentre.keys().next().value as number);
    byCentre.set(centre, found);
  }
  return found;
}

/** Losses of a chain, straight throughs left out, at a few frequencies. */
function lossesOf(factors: readonly (Network | undefined)[], frequencies: Float64Array): Float64Array {
  let total: Network | undefined;
  for (const factor of factors) if (factor) total = total ? chain(total, factor) : factor;
  return Float64Array.from(frequencies, (_, i) => (total ? lossDb(total.differential, i) : 0));
}

/** Where most is added, within 2 % of the middle. */
function bottomNear(added: Float64Array, middle: number): number {
  let bottom = middle;
  for (let i = 0; i < added.length; i++) {
    const far = i < middle ? offsets[i] : i > middle ? offsets[2 * middle - i] : 0;
    if (far <= alike && added[i] > added[bottom]) bottom = i;
  }
  return bottom;
}

/** Width in which the addition is less than 3 dB (or half) below its bottom; straight in dB between the points. */
function widthOf(frequencies: Float64Array, added: Float64Array, bottom: number): number {
  const edge = added[bottom] - Math.min(3, added[bottom] / 2);
  const reach = (step: 1 | -1): number => {
    for (let i = bottom; i + step >= 0 && i + step < added.length; i += step) {
      if (added[i + step] > edge) continue;
      const share = (added[i] - edge) / (added[i] - added[i + step]);
      return Math.abs(frequencies[i] + share * (frequencies[i + step] - frequencies[i]) - frequencies[bottom]);
    }
    return Math.abs(frequencies[step > 0 ? frequencies.length - 1 : 0] - frequencies[bottom]);
  };
  return Math.max(reach(-1) + reach(1), frequencies[bottom] / mostQuality);
}
