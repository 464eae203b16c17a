import { Type } from '@sinclair/typebox';
import { declares, LAYER_PATTERN, mapping, quantity, refers } from '../quantity';
import { common } from './common';

const remaining = (side: string) =>
  quantity('length', {
    description: `What is left of the barrel beyond the layer it must not cut, drilled from the ${side}.`,
    examples: ['0.3 mm ± 0.1 mm'],
    valid: [0, 0.1],
    plausible: [0.02e-3, 2e-3],
    default: 'not drilled',
  });

export const viaElement = mapping(
  'via',
  'A plated hole that joins two layers, or a pair of them. Its stub is derived from stackup, layers, span and backdrill.',
  {
    via: declares('element', 'Its own name.'),
    stackup: Type.Optional(refers('stackup', 'The stackup it goes through.', { examples: ['sled.main'] })),
    from: Type.Optional(
      refers('layer', 'The layer on the transmitter side.', { examples: ['L1'], default: 'the neighbouring trace’s' }),
    ),
    to: Type.Optional(
      refers('layer', 'The layer on the receiver side.', { examples: ['L6'], default: 'the neighbouring trace’s' }),
    ),
    span: Type.Optional(
      Type.Array(Type.String({ pattern: LAYER_PATTERN, 'x-refers': 'layer' }), {
        minItems: 2,
        maxItems: 2,
        description: 'First and last layer of a blind, buried or micro via.',
        examples: ['[L1, L4]'],
        'x-default': 'through',
      }),
    ),
    drill: Type.Optional(
      quantity('length', {
        description: 'The hole before plating.',
        examples: ['0.25 mm'],
        valid: [1e-6, 0.05],
        plausible: [0.05e-3, 3e-3],
      }),
    ),
    pad: Type.Optional(
      quantity('length', {
        description: 'Pad diameter on the layers that it joins.',
        examples: ['0.45 mm'],
        valid: [1e-6, 0.05],
        plausible: [0.1e-3, 5e-3],
        default: 'drill + 0.2 mm',
      }),
    ),
    antipad: Type.Optional(
      quantity('length', {
        description: 'Diameter of the clearance in each plane crossed.',
        examples: ['0.75 mm'],
        valid: [1e-6, 0.05],
        plausible: [0.15e-3, 8e-3],
      }),
    ),
    pitch: Type.Optional(
      quantity('length', {
        description: 'Centre to centre of the two holes of a pair.',
        examples: ['0.9 mm'],
        valid: [1e-6, 0.1],
        plausible: [0.2e-3, 10e-3],
      }),
    ),
    backdrill: Type.Optional(
      mapping(
        'backdrill',
        'Drilled away from one or both outer sides.',
        {
          top: Type.Optional(remaining('top')),
          bottom: Type.Optional(remaining('bottom')),
        },
        { examples: ['{ bottom: 0.3 mm ± 0.1 mm }'] },
      ),
    ),
    ...common,
  },
);
