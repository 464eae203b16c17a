import { reportedByStages } from './reported';
import type { Rule } from './types';

export const causality: Rule = {
  name: 'causality',
  severity: 'warning',
  reads: 'networks',
  options: {},
  doc: `By the initial figure of IEEE 370-2020 the data of a file answers before it is asked: its phase turns the wrong way over too much of the band.
Mostly too few points, a wrong reference plane or a mended file. The pulse computed from it is doubtful. The file is used as it is.`,
  bad: 'path: [{ connector: mate, touchstone: early.s4p, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]',
  good: 'path: [{ connector: mate, touchstone: thru.s4p, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]',
  check: reportedByStages,
};
