import type { ElementNetwork, NetworkContext, TwoPort } from '../networks/types';

/** A dip in the transmission that one element has for itself, between matched ends. */
export interface OwnDip {
  readonly frequencyHz: number;
  /** Above the loss of its surroundings, dB. */
  readonly depthDb: number;
}

/** An element with a stub is believed at this depth, any other at twice the power: a mismatched segment ripples by less. */
const leastStubDepthDb = 1;
const leastDepthDb = 3;
/** A stub's dip does not lie far below its own estimate; what does is the ripple of what stands beside it. */
const belowEstimate = 0.75;
/** No loss is taken as larger: an ideal notch would be infinite. */
export const mostLossDb = 200;

const decibels = (power: number) => Math.min(mostLossDb, -10 * Math.log10(Math.max(1e-30, power)));

/** Transmitted power at a dip of the least depth, from a crest of at most 1. */
const leastDipPower = 10 ** (-leastStubDepthDb / 10);

export const lossDb = (s: TwoPort, i: number): number => decibels(s[8 * i + 4] ** 2 + s[8 * i + 5] ** 2);

/**
 * Dips of an element's own differential transmission, refined between the grid's points on the element itself to 1e-6 of their frequency.
 * A lossy line has none: its loss grows with frequency all along.
 */
export function ownDips({ network, prepared, evaluate }: ElementNetwork, context: NetworkContext): readonly OwnDip[] {
  const { frequencies } = context;
  const powers = powersOf(network.differential);
  const stubs = prepared?.facts.stubs ?? [];
  const lowest = belowEstimate * Math.min(...stubs.map(({ notchHz }) => notchHz));
  const dips: OwnDip[] = [];
  for (let i = 1; i + 1 < powers.length; i++) {
    if (powers[i] > leastDipPower || powers[i] > powers[i - 1] || powers[i] >= powers[i + 1]) continue;
    const depthDb = prominenceDb(powers, i);
    const least = stubs.length > 0 && frequencies[i] >= lowest ? leastStubDepthDb : leastDepthDb;
    if (depthDb < least) continue;
    dips.push({ frequencyHz: refined(evaluate, context, frequencies[i - 1], frequencies[i + 1]), depthDb });
  }
  return dips;
}

/** |s21|² at each frequency. */
function powersOf(s: TwoPort): Float64Array {
  const powers = new Float64Array(s.length / 8);
  for (let i = 0; i < powers.length; i++) powers[i] = s[8 * i + 4] ** 2 + s[8 * i + 5] ** 2;
  return powers;
}

/** How far a minimum lies below the lower of the two crests between it and whatever is lower still, or the band's ends. */
function prominenceDb(powers: Float64Array, at: number): number {
  const crest = (step: 1 | -1) => {
    let most = powers[at];
    for (let i = at + step; i >= 0 && i < powers.length && powers[i] >= powers[at]; i += step)
      most = Math.max(most, powers[i]);
    return most;
  };
  return decibels(powers[at]) - decibels(Math.min(crest(-1), crest(1)));
}

/** The frequency of most loss between two points, by looking at 17 between them and then at those around the highest. */
function refined(evaluate: ElementNetwork['evaluate'], context: NetworkContext, from: number, to: number): number {
  let [low, high] = [from, to];
  for (let round = 0; round < 8 && high - low > 1e-6 * high; round++) {
    const frequencies = Float64Array.from({ length: 17 }, (_, i) => low + ((high - low) * i) / 16);
    const s = evaluate({ ...context, frequencies }).differential;
    let most = 0;
    for (let i = 1; i < 17; i++) if (lossDb(s, i) > lossDb(s, most)) most = i;
    low = frequencies[Math.max(0, most - 1)];
    high = frequencies[Math.min(16, most + 1)];
  }
  return (low + high) / 2;
}
