import { Type } from '@sinclair/typebox';
import { declares, mapping, quantity } from '../quantity';
import { common } from './common';

export const capacitorElement = mapping('capacitor', 'A series coupling capacitor in each leg.', {
  capacitor: declares('element', 'Its own name.'),
  value: Type.Optional(
    quantity('capacitance', {
      description: 'Capacitance of each leg.',
      examples: ['100 nF'],
      valid: [1e-15, 1],
      plausible: [1e-10, 1e-4],
    }),
  ),
  esl: Type.Optional(
    quantity('inductance', {
      description: 'Series inductance of each leg.',
      examples: ['0.3 nH'],
      valid: [0, 1e-3],
      plausible: [0, 3e-9],
      default: '0',
    }),
  ),
  esr: Type.Optional(
    quantity('impedance', {
      description: 'Series resistance of each leg.',
      examples: ['20 mohm'],
      valid: [0, 1e6],
      plausible: [0, 10],
      default: '0',
    }),
  ),
  'pad-capacitance': Type.Optional(
    quantity('capacitance', {
      description: 'Capacitance of the pads to the plane, of each leg, half at each end.',
      examples: ['30 fF'],
      valid: [0, 1e-9],
      plausible: [0, 1e-12],
      default: '0',
    }),
  ),
  ...common,
});
