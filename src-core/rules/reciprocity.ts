import { reportedByStages } from './reported';
import type { Rule } from './types';

export const reciprocity: Rule = {
  name: 'reciprocity',
  severity: 'warning',
  reads: 'networks',
  options: {},
  doc: `The data of a file transmits differently in its two directions, which no passive part of metal and laminate does: a slip in the measurement or
its calibration. The file is used as it is. \`active: true\` says that it may.`,
  bad: 'path: [{ connector: mate, touchstone: one-way.s4p, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]',
  good: 'path: [{ connector: mate, touchstone: one-way.s4p, active: true, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]',
  check: reportedByStages,
};
