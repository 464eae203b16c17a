import { Type } from '@sinclair/typebox';
import { declares, mapping } from '../quantity';
import { common, length, line, segment } from './common';

export const cableElement = mapping(
  'cable',
  'A cable: a segment with declared impedance, delay and loss.',
  {
    cable: declares('element', 'Its own name.'),
    length: Type.Optional({
      ...length,
      examples: ['0.5 m'],
      'x-quantity': { dimensions: ['length'], at: 'never', tolerance: true, valid: [0, 1e6], plausible: [1e-3, 100] },
    } as typeof length),
    ...line,
    ...common,
  },
  segment,
);
