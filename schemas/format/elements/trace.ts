import { Type } from '@sinclair/typebox';
import { declares, mapping, quantity, refers } from '../quantity';
import { common, length, line, segment } from './common';

export const traceElement = mapping(
  'trace',
  'A run of trace on one layer of a stackup: geometry, or declared impedance and loss.',
  {
    trace: declares('element', 'Its own name.'),
    stackup: Type.Optional(refers('stackup', 'The stackup it runs in.', { examples: ['sled.main'] })),
    layer: Type.Optional(refers('layer', 'The signal layer it runs on.', { examples: ['L6'] })),
    length: Type.Optional(length),
    width: Type.Optional(
      quantity('length', {
        description: 'Width of each leg.',
        examples: ['110 um ± 12 um'],
        valid: [1e-6, 1],
        plausible: [20e-6, 3e-3],
      }),
    ),
    gap: Type.Optional(
      quantity('length', {
        description: 'Gap between the legs, edge to edge.',
        examples: ['140 um'],
        valid: [1e-6, 1],
        plausible: [20e-6, 5e-3],
      }),
    ),
    ...line,
    ...common,
  },
  segment,
);
