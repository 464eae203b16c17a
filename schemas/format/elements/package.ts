import { Type } from '@sinclair/typebox';
import { declares, mapping } from '../quantity';
import { common, length, line, segment } from './common';

export const packageElement = mapping(
  'package',
  'The run through a chip package: a segment with declared impedance, delay and loss.',
  {
    package: declares('element', 'Its own name.'),
    length: Type.Optional({ ...length, examples: ['14 mm'] } as typeof length),
    ...line,
    ...common,
  },
  segment,
);
