import type { ElementKind } from '../networks/types';

/** A block is its Touchstone file, whose network is made where all files are; without one there is nothing to compute. */
export const blockKind: ElementKind<never> = {
  prepare: () => undefined,
  network: () => {
    throw new Error('A block without a file has no network');
  },
};
