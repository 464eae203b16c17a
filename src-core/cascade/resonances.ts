import type { Network, Networks } from '../networks/types';
import type { Resonance } from './types';

export function resonancesOf(_networks: Networks, _total: Network): readonly Resonance[] {
  return [];
}
