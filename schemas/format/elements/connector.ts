import { Type } from '@sinclair/typebox';
import { declares, mapping, quantities, quantity } from '../quantity';
import { common, line } from './common';

export const connectorElement = mapping(
  'connector',
  'A connector: a Touchstone file, or delay, impedance, loss and capacitance.',
  {
    connector: declares('element', 'Its own name.'),
    impedance: line.impedance,
    'common-impedance': line['common-impedance'],
    delay: Type.Optional(
      quantity('time', {
        description: 'Delay through it.',
        examples: ['60 ps'],
        valid: [0, 1e-6],
        plausible: [0, 2e-9],
      }),
    ),
    loss: Type.Optional(
      quantities('loss', {
        description: 'Loss when matched: one point, split by `skin-share`, or a list fitted by a·√f + b·f.',
        examples: ['0.6 dB @ 12.9 GHz'],
        at: 'required',
        valid: [0, 200],
        plausible: [0, 20],
        default: '0',
      }),
    ),
    'skin-share': line['skin-share'],
    capacitance: Type.Optional(
      quantity('capacitance', {
        description: 'Capacitance of each leg, half at each end.',
        examples: ['40 fF'],
        valid: [0, 1e-9],
        plausible: [0, 2e-12],
        default: '0',
      }),
    ),
    skew: line.skew,
    ...common,
  },
);
