import { reportedByStages } from './reported';
import type { Rule } from './types';

export const configuration: Rule = {
  name: 'configuration',
  severity: 'warning',
  reads: 'model',
  options: {},
  doc: `\`lanewright.config.yaml\` names a rule or an option that does not exist, or gives it a value that it cannot have. The setting is ignored and the
default holds. Shown in the configuration itself, once, not in each channel below it.`,
  bad: '# lanewright.config.yaml\nrules: { stub-resonanse: off }',
  good: '# lanewright.config.yaml\nrules: { stub-resonance: off }',
  check: reportedByStages,
};
