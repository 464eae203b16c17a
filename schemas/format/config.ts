import { type Static, Type } from '@sinclair/typebox';
import { channelProperties } from './channel';
import { mapping, named, quantity } from './quantity';

export const severities = ['error', 'warning', 'info', 'hint', 'off'] as const;
export type SeveritySetting = (typeof severities)[number];

/** `rules`: a rule's name, then a severity or `{ severity, option: … }`; names and options are checked against the list of rules. */
export const config = mapping(
  'config',
  'Severities and options of rules; the nearest such file upwards counts.',
  {
    lanewright: channelProperties.lanewright,
    rules: Type.Optional(
      named(undefined, 'By the rule’s name: a severity, or `severity` and the rule’s options.', Type.Any(), {
        'x-entries': 'rules',
      }),
    ),
    review: Type.Optional(
      mapping(
        'review',
        'What makes a review fail; read from the base of the review, so that no change can loosen its own.',
        {
          'fail-on': Type.Optional(
            Type.Union([Type.Literal('error'), Type.Literal('regression'), Type.Literal('any')], {
              description: 'Any error, what got worse, or any change with an effect.',
              examples: ['regression'],
              'x-default': 'regression',
            }),
          ),
          'loss-reserve': Type.Optional(
            quantity('loss', {
              description: 'By how much the reserve of an insertion-loss limit may fall.',
              examples: ['0.2 dB'],
              default: '0.2 dB',
              tolerance: false,
              valid: [0, 100],
              plausible: [0, 10],
            }),
          ),
          'eye-height': Type.Optional(
            quantity('ratio', {
              description: 'By how much the height of the eye may fall, as a share of its limit.',
              examples: ['0.05'],
              default: '0.05',
              tolerance: false,
              valid: [0, 10],
              plausible: [0, 1],
            }),
          ),
        },
      ),
    ),
  },
  { required: ['lanewright'] },
);
export type ConfigValues = Static<typeof config>;
