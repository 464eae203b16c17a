import { type Static, Type } from '@sinclair/typebox';

/** What `lanewright check --format json` prints. Keys are only ever added within one `version`. */
export const CHECK_OUTPUT_VERSION = 1;

export const object = <T extends Record<string, import('@sinclair/typebox').TSchema>>(
  properties: T,
  options: Record<string, unknown> = {},
) => Type.Object(properties, { additionalProperties: false, ...options });

const position = object({
  line: Type.Integer({ minimum: 1 }),
  column: Type.Integer({ minimum: 1, description: 'In UTF-16 units, from 1.' }),
});
const range = object({ start: position, end: position });
export const location = object({ file: Type.String({ description: 'From the root, with `/`.' }), range });

const edit = object({ file: Type.String(), range, text: Type.String() });
const fix = object({
  title: Type.String({ description: 'Says what is gained, where that was computed.' }),
  safe: Type.Boolean({ description: 'Changes nothing that is computed from a valid file; `--fix` takes it.' }),
  edits: Type.Array(edit),
});

export const figure = object({
  name: Type.String(),
  title: Type.String(),
  value: Type.Number(),
  unit: Type.String(),
  text: Type.String({ description: 'As every surface shows it.' }),
  note: Type.Optional(Type.String()),
});

export const severity = Type.Union([
  Type.Literal('error'),
  Type.Literal('warning'),
  Type.Literal('info'),
  Type.Literal('hint'),
]);

export const verdict = object({
  state: Type.Union([
    Type.Literal('good'),
    Type.Literal('warnings'),
    Type.Literal('errors'),
    Type.Literal('not-computed'),
  ]),
  text: Type.String(),
});

const finding = object({
  rule: Type.String(),
  severity,
  message: Type.String(),
  subject: Type.Optional(Type.String({ description: 'The element or limit that it is about.' })),
  location,
  value: Type.Optional(Type.Number()),
  valueText: Type.Optional(Type.String()),
  related: Type.Array(object({ message: Type.String(), location })),
  fixes: Type.Array(fix),
  waived: Type.Boolean({ description: 'Accepted by a waiver: counts for nothing.' }),
});

const limit = object({
  name: Type.String(),
  kind: Type.String(),
  met: Type.Boolean(),
  limit: figure,
  actual: figure,
  marginShare: Type.Number({ description: 'What is in hand, as a share of the limit; negative: missed.' }),
  text: Type.String(),
});

const row = object({
  element: Type.String(),
  kind: Type.String(),
  figures: Type.Array(figure),
  owner: Type.Optional(Type.String()),
  budget: Type.Optional(
    object({ allowedDb: Type.Number(), spentDb: Type.Number(), share: Type.Number(), text: Type.String() }),
  ),
  cumulativeDb: Type.Number(),
  cumulativeShare: Type.Optional(Type.Number()),
});

const resonance = object({
  frequencyHz: Type.Number(),
  depthDb: Type.Number(),
  lossDb: Type.Number(),
  quality: Type.Number(),
  elements: Type.Array(Type.String()),
  text: Type.String(),
});

const file = object({
  file: Type.String(),
  kind: Type.Union([Type.Literal('channel'), Type.Literal('parts'), Type.Literal('config')]),
  title: Type.Optional(Type.String()),
  verdict: Type.Optional(verdict),
  figures: Type.Array(figure),
  limits: Type.Array(limit),
  ledger: Type.Array(row),
  reflectionsDb: Type.Optional(
    Type.Number({ description: 'What is missing from the sum of own losses to the figure of the whole.' }),
  ),
  resonances: Type.Array(resonance),
  findings: Type.Array(finding),
  timedOut: Type.Boolean(),
});

export const checkOutput = object(
  {
    version: Type.Literal(CHECK_OUTPUT_VERSION),
    tool: object({ name: Type.Literal('lanewright'), version: Type.String() }),
    files: Type.Array(file),
    counts: object({
      files: Type.Integer(),
      errors: Type.Integer(),
      warnings: Type.Integer(),
      infos: Type.Integer(),
      hints: Type.Integer(),
      waived: Type.Integer(),
    }),
  },
  { title: 'Output of lanewright check', description: 'Figures are planning estimates.' },
);

export type CheckOutput = Static<typeof checkOutput>;
export type CheckedFile = CheckOutput['files'][number];
