import { reportedByStages } from './reported';
import type { Rule } from './types';

export const passivity: Rule = {
  name: 'passivity',
  severity: 'warning',
  reads: 'networks',
  options: {},
  doc: `The data of a file gives back more power than it takes: its largest singular value exceeds 1. No connector can; a measurement or export did. The
file is used as it is, never mended in silence. \`active: true\` says that it may.`,
  bad: 'path: [{ connector: mate, touchstone: gain.s4p, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]',
  good: 'path: [{ connector: mate, touchstone: gain.s4p, active: true, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]',
  check: reportedByStages,
};
