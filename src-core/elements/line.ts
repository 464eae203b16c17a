import type { Network, NetworkContext, TwoPort } from '../networks/types';
import { type ComputedLine, scatterComputed } from './computed-line';
import { type DeclaredLine, scatterDeclared } from './declared-line';
import { delaySecondLeg } from './skew';

/** Either kind of line, lengths already multiplied in; of one leg. */
export type Line = (ComputedLine | DeclaredLine) & { readonly skewSeconds: number };

/** What a wave on one leg meets on either side. */
export const legReference = ({ referenceOhms, singleEnded }: NetworkContext) =>
  singleEnded ? referenceOhms : referenceOhms / 2;

/** Equal legs that do not couple: both modes see the same two-port in their own references. */
export function equalLegs(leg: TwoPort, { singleEnded }: NetworkContext): Network {
  return singleEnded ? { differential: leg } : { differential: leg, common: leg };
}

/** A segment's network: both modes, and their conversion where the second leg is later. */
export function lineNetwork(line: Line, context: NetworkContext): Network {
  const reference = legReference(context);
  const scatter = line.model === 'declared' ? scatterDeclared : scatterComputed;
  const odd = scatter(line as never, 'odd', context.frequencies, reference);
  if (context.singleEnded) return { differential: odd };
  const even = line.alike ? odd : scatter(line as never, 'even', context.frequencies, reference);
  return delaySecondLeg({ differential: odd, common: even }, line.skewSeconds, context.frequencies);
}
