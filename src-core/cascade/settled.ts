import type { Model } from '../model/types';
import { computeNetworks } from '../networks/compute';
import { measuredDecay } from '../networks/decay';
import type { Decay } from '../networks/grid';
import type { TouchstoneResult } from '../networks/touchstone-types';
import type { Networks } from '../networks/types';
import { cascadeOf } from './cascade';
import { remainingError } from './remaining-error';
import type { Cascade } from './types';

export interface Chain {
  readonly networks: Networks;
  readonly cascade: Cascade;
}

/** The chain on the estimated grid and on each finer one that the response asked for; the last one counts. */
export interface SettledChain extends Chain {
  readonly attempts: readonly Chain[];
  /** How many element networks and products were computed, not found. */
  readonly computed: { readonly networks: number; readonly products: number };
}

export interface ChainOptions {
  /** While one types: the grid of before is kept while it suffices (see `chooseGrid`). */
  readonly keepGrid?: boolean;
  /** Asked between kernels; throws to give up. */
  readonly checkTime?: () => void;
}

/** Each attempt may ask for a grid four times as fine; more than this the cap on points does not allow. */
const mostAttempts = 4;

/**
 * Stages 2 and 3 on a grid that holds the response. The grid comes from an estimate of the decay; where the computed response turns out
 * to last longer than that grid allows for, both are computed once more on the grid that it asks for. Attempts keep their networks
 * apart, so that an edit of a channel which needed two costs two small computations, and ends in the state of a cold start.
 */
export function settledChain(
  model: Model,
  touchstoneOf: (file: string) => TouchstoneResult | undefined,
  previous?: SettledChain,
  { keepGrid = false, checkTime }: ChainOptions = {},
): SettledChain {
  const attempts: Chain[] = [];
  const computed = { networks: 0, products: 0 };
  let measured: Decay | undefined;
  for (let i = 0; i < mostAttempts; i++) {
    // While one types, the first attempt goes on with the grid on which the last analysis came to rest.
    const before = (keepGrid && i === 0 ? previous : previous?.attempts[i]) ?? attempts[i - 1];
    const networks = computeNetworks(model, touchstoneOf, before?.networks, {
      keepGrid: keepGrid && i === 0,
      measured,
      checkTime,
    });
    checkTime?.();
    const cascade = withError(cascadeOf(networks, before?.cascade), before, networks, model);
    if (networks !== before?.networks) computed.networks += networks.computed ?? 0;
    if (cascade !== before?.cascade) computed.products += cascade.products ?? 0;
    attempts.push({ networks, cascade });
    const { grid } = networks;
    measured = measuredDecay(model, cascade.total, grid);
    if (grid.tooCoarse || 4 * measured.decaySeconds * grid.stepHz <= 1) break;
  }
  return { ...attempts[attempts.length - 1], attempts, computed };
}

/** What a grid that is too coarse does to the cursors, measured where networks or ends changed. */
function withError(cascade: Cascade, before: Chain | undefined, networks: Networks, model: Model): Cascade {
  if (!networks.grid.tooCoarse || networks === before?.networks) return cascade;
  const error = remainingError(model, networks, cascade.total);
  if (cascade === before?.cascade && error === cascade.remainingError) return cascade;
  return { ...cascade, remainingError: error };
}
