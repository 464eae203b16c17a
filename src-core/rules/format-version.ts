import { reportedByStages } from './reported';
import type { Rule } from './types';

export const formatVersion: Rule = {
  name: 'format-version',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `The file says with \`lanewright\` that it is written for another major version of the format. Nothing is computed, since a key may mean
something else there. Update Lanewright, or write the version that this release reads.`,
  bad: 'lanewright: 2',
  good: 'lanewright: 1',
  check: reportedByStages,
};
