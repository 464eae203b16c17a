import type { Quantity } from '../../schemas/format/types';
import { readValues } from '../format/index';
import { isMapping, mappingAt } from '../raw';
import { defaultThresholds } from './policy';
import { type Policy, policies, type Thresholds } from './types';

/** How a review is judged. */
export interface ReviewSettings {
  /** Absent: as the caller says. */
  readonly policy?: Policy;
  readonly thresholds: Thresholds;
}

/**
 * What `review:` in a configuration says; what it leaves out is the default. Of a review it is base's that counts.
 * @param value the configuration as YAML gave it; undefined where there is none
 */
export function settingsOf(value: unknown): ReviewSettings {
  if (!isMapping(value)) return { thresholds: defaultThresholds };
  const written = mappingAt(readValues('config', value).values, 'review');
  const policy = policies.find((one) => one === written['fail-on']);
  const number = (key: string, byDefault: number) => (written[key] as Quantity | undefined)?.value ?? byDefault;
  return {
    ...(policy && { policy }),
    thresholds: {
      lossReserveDb: number('loss-reserve', defaultThresholds.lossReserveDb),
      eyeHeightShare: number('eye-height', defaultThresholds.eyeHeightShare),
    },
  };
}
