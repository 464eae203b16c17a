import { type Static, Type } from '@sinclair/typebox';
import { channelProperties } from './channel';
import { mapping, named } from './quantity';

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
  },
  { required: ['lanewright'] },
);
export type ConfigValues = Static<typeof config>;
