import { sameValue } from '../same-value';
import { type Probe, probeOf } from './decay';
import type { Recipe } from './recipe';
import { straightThrough } from './through';
import type { ElementNetwork, Network, NetworkContext } from './types';

/** By what they were evaluated on, then by content. A recipe that is kept brings the same text, which is found without being read. */
type ByContext<T> = Map<string, Map<string, T>>;

/** What one analysis used. */
interface Used {
  readonly networks: ByContext<Network>;
  readonly probes: ByContext<Probe>;
}

/** What this analysis and the one before used; older networks are let go. */
export interface Kept {
  readonly current: Used;
  readonly last?: Used;
  /** By the element's name, and what of the model they were made from. */
  readonly recipes: ReadonlyMap<string, Recipe>;
  readonly basis: unknown;
}

/** Gives each element's network and probe, computed at most once by content. A kind's failure gives a straight through and is told. */
export function openShelf(previous: Kept | undefined) {
  const current: Used = { networks: new Map(), probes: new Map() };
  const shelves = [current, previous?.current, previous?.last];
  const contextKeys = new Map<NetworkContext, string>();
  let computed = 0;

  const keyOf = (context: NetworkContext) => {
    let key = contextKeys.get(context);
    if (key === undefined) contextKeys.set(context, (key = contextKey(context)));
    return key;
  };

  return {
    recipesFor: (basis: unknown) => (previous && sameValue(previous.basis, basis) ? previous.recipes : undefined),
    keep: (basis: unknown, recipes: readonly Recipe[]): Kept => ({
      current,
      last: previous?.current,
      recipes: new Map(recipes.map((recipe) => [recipe.element.name, recipe])),
      basis,
    }),
    computed: () => computed,

    /** Undefined for what is no element: a straight through. */
    probe(recipe: Recipe, context: NetworkContext, nyquist: number): Probe | undefined {
      const { key } = recipe;
      if (key === undefined) return undefined;
      const on = keyOf(context);
      let probe = find(shelves, (used) => used?.probes.get(on)?.get(key));
      if (!probe) {
        const network = attempt(recipe, context).network;
        probe = network && probeOf(network, recipe.prepared?.facts, nyquist);
      }
      if (probe) put(current.probes, on, key, probe);
      return probe;
    },

    element(recipe: Recipe, context: NetworkContext): ElementNetwork & { failure?: unknown } {
      const { element, prepared, key } = recipe;
      if (key === undefined) return { ...throughOf(recipe, context), failure: recipe.failure };
      const on = keyOf(context);
      let network = find(shelves, (used) => used?.networks.get(on)?.get(key));
      if (!network) {
        const attempted = attempt(recipe, context);
        if (!attempted.network) return { ...throughOf(recipe, context), failure: attempted.failure };
        network = attempted.network;
        computed++;
      }
      put(current.networks, on, key, network);
      return { element, prepared, network, through: false, evaluate: recipe.evaluate };
    },
  };
}

function put<T>(shelf: ByContext<T>, context: string, key: string, item: T): void {
  const there = shelf.get(context);
  if (there) there.set(key, item);
  else shelf.set(context, new Map([[key, item]]));
}

const throughOf = ({ element, prepared }: Recipe, context: NetworkContext): ElementNetwork => ({
  element,
  prepared,
  network: straightThrough(context),
  through: true,
  evaluate: straightThrough,
});

function find<T, R>(items: readonly T[], look: (item: T) => R | undefined): R | undefined {
  for (const item of items) {
    const found = look(item);
    if (found !== undefined) return found;
  }
  return undefined;
}

function attempt({ evaluate }: Recipe, context: NetworkContext): { network?: Network; failure?: unknown } {
  try {
    const network = evaluate(context);
    const wrong = [network.differential, network.common, network.full].find((s) => s && !allFinite(s));
    return wrong ? { failure: new Error('its network holds a number that is not finite') } : { network };
  } catch (failure) {
    return { failure };
  }
}

const allFinite = (numbers: Float64Array) => {
  // A sum of finite numbers of this size stays finite; one that is not spoils it.
  let sum = 0;
  for (let i = 0; i < numbers.length; i++) sum += numbers[i];
  return Number.isFinite(sum);
};

const contextKey = ({ frequencies: f, referenceOhms, singleEnded }: NetworkContext) =>
  `${f.length} ${f[1]} ${f[f.length - 1]} ${referenceOhms} ${singleEnded}`;
