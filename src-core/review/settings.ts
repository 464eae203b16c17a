import type { Quantity } from '../../schemas/format/types';
import type { Analysis } from '../analysis';
import { readValues } from '../format/index';
import { mappingAt } from '../raw';
import { defaultThresholds } from './policy';
import { type Policy, policies, type Thresholds } from './types';

/** How a review is judged. */
export interface ReviewSettings {
  /** Absent: as the caller says. */
  readonly policy?: Policy;
  readonly thresholds: Thresholds;
}

/** What `review:` in the configuration of a channel says; what it leaves out is the default. Of a review it is base's that counts. */
export function settingsOf(analysis: Analysis | undefined): ReviewSettings {
  const file = analysis?.inputs.configFile;
  const value = file === undefined ? undefined : analysis?.parsed.get(file)?.value;
  if (value === undefined || value === null) return { thresholds: defaultThresholds };
  const written = mappingAt(readValues('config', value as Record<string, unknown>).values, 'review');
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
