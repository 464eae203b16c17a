import { type CrossSection, crossSection, type TraceGeometry, widthForImpedance } from '../physics/cross-section';

/**
 * Cross-sections by content. All elements are prepared at every edit, and a channel has few unlike cross-sections: those of the last
 * edits are held. The functions are pure, so that a held result is the result.
 */
const MOST = 256;

function held<In, Out>(compute: (input: In) => Out): (input: In) => Out {
  const results = new Map<string, Out>();
  return (input) => {
    const key = JSON.stringify(input);
    const found = results.get(key);
    if (found !== undefined) return found;
    const computed = compute(input);
    if (results.size >= MOST) results.delete(results.keys().next().value as string);
    results.set(key, computed);
    return computed;
  };
}

export const heldCrossSection: (geometry: TraceGeometry) => CrossSection = held(crossSection);

interface Wanted {
  readonly geometry: Omit<TraceGeometry, 'widthMeters' | 'gapMeters'>;
  readonly pair: boolean;
  readonly ohms: number;
}

export const heldWidth = held(({ geometry, pair, ohms }: Wanted) => widthForImpedance(geometry, pair, ohms));
