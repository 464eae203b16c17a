import type { Analysis } from '../analysis';

/** The stages as far as they could be computed; every analysis is one. */
export type Computed = Pick<Analysis, 'model' | 'networks' | 'cascade' | 'time' | 'link' | 'linkIsStale'>;
