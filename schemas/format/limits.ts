import { type Static, Type } from '@sinclair/typebox';
import { band, declares, mapping, quantities, quantity, refers } from './quantity';

const between = Type.Optional(
  Type.Array(refers('element', 'An element.'), {
    examples: ['[breakout, twinax]'],
    minItems: 2,
    maxItems: 2,
    description: 'From the input of the first to the output of the second element.',
    'x-default': 'all of path',
  }),
);

export const limitSchemas = {
  'insertion-loss': mapping(
    'insertion-loss',
    'Most loss at a frequency, or against a mask: straight in dB over frequency, judged between its ends.',
    {
      'insertion-loss': declares('limit', 'Its own name.'),
      between,
      max: Type.Optional(
        quantities('loss', {
          description: 'Most loss.',
          examples: ['24 dB @ nyquist', '[2 dB @ 50 MHz, 9 dB @ 4 GHz, 24 dB @ 12.9 GHz]'],
          at: 'nyquist',
          tolerance: false,
          valid: [0, 500],
          plausible: [0.1, 100],
        }),
      ),
      note: Type.Optional(Type.String({ description: 'Free text.' })),
    },
  ),
  'return-loss': mapping('return-loss', 'Least return loss in a band.', {
    'return-loss': declares('limit', 'Its own name.'),
    between,
    at: Type.Optional(
      Type.Union([Type.Literal('transmitter'), Type.Literal('receiver')], {
        description: 'The end one looks in from.',
        examples: ['receiver'],
        'x-default': 'both ends',
      }),
    ),
    band: Type.Optional(band('Where it is judged.')),
    min: Type.Optional(
      quantity('loss', {
        description: 'Least return loss.',
        examples: ['10 dB'],
        tolerance: false,
        valid: [0, 100],
        plausible: [1, 40],
      }),
    ),
    note: Type.Optional(Type.String({ description: 'Free text.' })),
  }),
  eye: mapping(
    'eye',
    'Least opening of the eye at the target BER: a rhombus of height and width, at the phase where it fits best, at most a quarter of its width from the sampling instant.',
    {
      eye: declares('limit', 'Its own name.'),
      height: Type.Optional(
        quantity('voltage', {
          description: 'Least height, peak to peak.',
          examples: ['40 mV'],
          tolerance: false,
          valid: [0, 100],
          plausible: [1e-4, 2],
        }),
      ),
      width: Type.Optional(
        quantity('unitInterval', {
          description: 'Least width.',
          examples: ['0.35 UI'],
          or: ['time'],
          tolerance: false,
          valid: [0, 1],
          plausible: [0.01, 0.99],
        }),
      ),
      note: Type.Optional(Type.String({ description: 'Free text.' })),
    },
  ),
};

export type LimitKindName = keyof typeof limitSchemas;
export type LimitValues = { [K in LimitKindName]: Static<(typeof limitSchemas)[K]> };

export const waiver = mapping(
  'waiver',
  'A finding accepted in writing.',
  {
    rule: refers('rule', 'The rule whose finding is accepted.', { examples: ['return-loss'] }),
    at: Type.String({ description: 'The element or limit where it stands.', examples: ['receiver-side'] }),
    'up-to': Type.Optional(
      Type.Unsafe<string>({
        type: ['string', 'number'],
        description: 'The worst accepted value, where the finding has one.',
        examples: ['9.1 dB'],
      }),
    ),
    until: Type.String({
      description: 'The last day on which it is accepted, YYYY-MM-DD.',
      pattern: '^[0-9]{4}-[0-9]{2}-[0-9]{2}$',
      examples: ['2027-03-31'],
    }),
    by: Type.String({ description: 'Who accepted it.', examples: ['connector team'] }),
    reason: Type.String({ description: 'Why.', examples: ['replaced in revision C'] }),
  },
  { required: ['rule', 'at', 'until', 'by', 'reason'] },
);
