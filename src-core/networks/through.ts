import type { Network, NetworkContext, TwoPort } from './types';

/** A straight through of both modes: matched, without loss or delay. Stands for what is left out or already held elsewhere. */
export function straightThrough({ frequencies, singleEnded }: NetworkContext): Network {
  const differential: TwoPort = new Float64Array(8 * frequencies.length);
  for (let at = 0; at < differential.length; at += 8) {
    differential[at + 2] = 1;
    differential[at + 4] = 1;
  }
  return singleEnded ? { differential } : { differential, common: differential };
}
