import { Type } from '@sinclair/typebox';
import { declares, mapping, quantity } from '../quantity';
import { common, length } from './common';

export const stubElement = mapping(
  'stub',
  'A branch on each leg that ends open: a test point, an unpopulated option.',
  {
    stub: declares('element', 'Its own name.'),
    length: Type.Optional({ ...length, examples: ['0.9 mm'] } as typeof length),
    impedance: Type.Optional(
      quantity('impedance', {
        description: 'Impedance of each leg’s branch.',
        examples: ['50 ohm'],
        valid: [1e-3, 1e4],
        plausible: [10, 200],
      }),
    ),
    dk: Type.Optional(
      quantity('ratio', {
        description: 'Dielectric constant that the branch feels.',
        examples: ['3.6'],
        at: 'optional',
        valid: [1, 100],
        plausible: [1, 15],
      }),
    ),
    df: Type.Optional(
      quantity('ratio', {
        description: 'Loss tangent that belongs to `dk`.',
        examples: ['0.004'],
        at: 'optional',
        valid: [0, 0.2],
        plausible: [0, 0.1],
        default: '0',
      }),
    ),
    'end-capacitance': Type.Optional(
      quantity('capacitance', {
        description: 'Capacitance at the open end.',
        examples: ['20 fF'],
        valid: [0, 1e-9],
        plausible: [0, 2e-12],
        default: '0',
      }),
    ),
    ...common,
  },
);
