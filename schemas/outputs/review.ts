import { type Static, Type } from '@sinclair/typebox';
import { figure, location, object, severity, verdict } from './check';

/** What `lanewright review --format json` prints. Keys are only ever added within one `version`. */
export const REVIEW_OUTPUT_VERSION = 1;

const change = object({
  subject: Type.String({ description: 'Element, limit, part or rule, as the head names it.' }),
  attribute: Type.String(),
  from: Type.Optional(Type.String()),
  to: Type.Optional(Type.String()),
  derived: Type.Boolean({ description: 'Follows from other changes; stands in no text.' }),
  electrical: Type.Boolean({ description: 'Changes what is computed.' }),
  words: Type.String(),
  location,
  group: Type.Integer({ minimum: 0, description: 'Changes of one number belong together; 0: none.' }),
});

const figureChange = object({
  name: Type.String(),
  title: Type.String(),
  from: Type.Optional(figure),
  to: Type.Optional(figure),
  deltaText: Type.String(),
  better: Type.Optional(Type.Boolean({ description: 'Absent where neither way is worse.' })),
});

const finding = object({
  rule: Type.String(),
  severity,
  message: Type.String(),
  subject: Type.Optional(Type.String()),
  location,
});

const cause = object({
  group: Type.Integer({ minimum: 1 }),
  words: Type.String(),
  alone: Type.Array(figureChange, { description: 'The group added to the base.' }),
  without: Type.Array(figureChange, { description: 'The group taken from the head.' }),
});

const channel = object({
  file: Type.String(),
  renamedFrom: Type.Optional(Type.String()),
  lane: Type.Optional(Type.String()),
  title: Type.String(),
  state: Type.Union([
    Type.Literal('changed'),
    Type.Literal('no-effect'),
    Type.Literal('added'),
    Type.Literal('removed'),
    Type.Literal('broken'),
  ]),
  because: Type.Array(Type.String(), { description: 'The files because of which alone it changed; empty: itself.' }),
  changes: Type.Array(change),
  figures: Type.Array(figureChange),
  appeared: Type.Array(finding),
  gone: Type.Array(finding),
  waivers: Type.Array(change),
  loosened: Type.Array(change, { description: 'Limits and rules that allow more than before.' }),
  verdict: object({ from: Type.Optional(verdict), to: Type.Optional(verdict) }),
  causes: Type.Array(cause),
  together: Type.Optional(Type.Array(figureChange, { description: 'What the groups alone do not explain.' })),
  smallestMarginFall: Type.Optional(Type.Number({ description: 'As a share of the limit; negative: it grew.' })),
  notes: Type.Array(Type.String()),
});

export const reviewOutput = object(
  {
    version: Type.Literal(REVIEW_OUTPUT_VERSION),
    tool: object({ name: Type.Literal('lanewright'), version: Type.String() }),
    base: Type.String(),
    head: Type.String(),
    channels: Type.Array(channel, { description: 'The worst first.' }),
    unchanged: Type.Integer({ description: 'Channels that the change does not touch.' }),
    notes: Type.Array(Type.String()),
    failed: object({
      policy: Type.Union([Type.Literal('error'), Type.Literal('regression'), Type.Literal('any')]),
      reasons: Type.Array(Type.String(), { description: 'Empty: passed.' }),
    }),
  },
  { title: 'Output of lanewright review', description: 'Figures are planning estimates.' },
);

export type ReviewOutput = Static<typeof reviewOutput>;
export type ReviewedChannel = ReviewOutput['channels'][number];
