import { type Static, type TSchema, Type } from '@sinclair/typebox';

/** What a quantity may measure. Each dimension's units stand in `src-core/quantity/units.ts`. */
export type Dimension =
  | 'length'
  | 'time'
  | 'frequency'
  | 'impedance'
  | 'capacitance'
  | 'inductance'
  | 'voltage'
  | 'loss' // dB
  | 'lossPerLength' // dB/m
  | 'delayPerLength' // s/m
  | 'velocity' // m/s; `0.6 c` too
  | 'bitRate'
  | 'conductivity'
  | 'temperature' // degC, kept in degC
  | 'unitInterval' // UI
  | 'ratio'; // without unit: dk, df, share

/** A quantity as read: SI inside. The same shape for every dimension. */
export interface Quantity {
  /** In the SI unit of `dimension` (degC for temperature, dB for loss, UI for unitInterval). */
  readonly value: number;
  readonly dimension: Dimension;
  /** As written, trimmed. */
  readonly text: string;
  /** The unit in its ASCII spelling; '' where there is none. */
  readonly unit: string;
  /** Absolute, in the unit of `value`, both >= 0; 0 where no tolerance is written. */
  readonly plus: number;
  readonly minus: number;
  /** True where the text says `(3 sigma)`: the tolerance is three standard deviations of a normal, not a hard bound. */
  readonly threeSigma: boolean;
  /** The frequency at which it holds, where one is written. */
  readonly at?: number | 'nyquist';
}

/** `50 MHz to 12 GHz` */
export interface Band {
  readonly fromHz: number;
  readonly toHz: number;
  readonly text: string;
}

export interface QuantityOptions {
  description: string;
  examples?: readonly string[];
  /** Other dimensions that the key takes, besides the first. */
  or?: readonly Dimension[];
  /** Values outside are a finding `implausible-quantity`, in SI units of the first dimension. */
  plausible?: readonly [number, number];
  /** Values outside make no sense and are errors, in SI units of the first dimension. */
  valid?: readonly [number, number];
  /** `@ frequency`: whether one may, must or must not be written; `nyquist` also allows `@ nyquist`. */
  at?: 'never' | 'optional' | 'required' | 'nyquist';
  /** Whether ± is allowed; default true. */
  tolerance?: boolean;
  /** What holds where the key is absent, in words or as a quantity; for hover, hints and the reference. */
  default?: string;
}

/**
 * A key that holds a quantity: text in the file, a {@link Quantity} in the parsed value (so `Static<>` is the type *after*
 * reading). In the JSON Schema it is a string with the keyword `x-quantity`; a `ratio` may be a bare number.
 */
export const quantity = (dimension: Dimension, options: QuantityOptions) => {
  const { description, examples, default: byDefault, or, plausible, valid, at = 'never', tolerance = true } = options;
  const bare = dimension === 'ratio' || or?.includes('ratio');
  return Type.Unsafe<Quantity>({
    type: bare ? ['string', 'number'] : 'string',
    description,
    ...(examples && { examples }),
    ...(byDefault !== undefined && { 'x-default': byDefault }),
    'x-quantity': {
      dimensions: [dimension, ...(or ?? [])],
      at,
      tolerance,
      ...(plausible && { plausible }),
      ...(valid && { valid }),
    },
  });
};

/** One quantity or a list of them, read as a list. */
export const quantities = (dimension: Dimension, options: QuantityOptions) => {
  const { description, ...rest } = options;
  const one = quantity(dimension, { description, ...rest }) as unknown as Record<string, unknown>;
  const { 'x-quantity': reading, 'x-default': _default, examples, description: _description, ...shape } = one;
  return Type.Unsafe<readonly Quantity[]>({
    description,
    ...(examples ? { examples } : {}),
    ...(options.default !== undefined && { 'x-default': options.default }),
    anyOf: [shape, { type: 'array', items: shape, minItems: 1, maxItems: 100 }],
    'x-quantity': { ...(reading as object), list: true },
  });
};

export const band = (description: string) =>
  Type.Unsafe<Band>({
    type: 'string',
    description,
    examples: ['50 MHz to 12 GHz'],
    'x-quantity': { dimensions: ['frequency'], band: true },
  });

/** A name of our own: `[a-z][a-z0-9-]*`, not a YAML 1.1 boolean. */
export const NAME_PATTERN = '^(?!(?:true|false|null|yes|no|on|off)$)[a-z][a-z0-9-]*$';
export const LAYER_PATTERN = '^[A-Za-z0-9][A-Za-z0-9_.-]*$';

/** What a name refers to; drives completion, jumps and rename. */
export type NameRole =
  | 'element'
  | 'limit'
  | 'part'
  | 'stackup'
  | 'material'
  | 'foil'
  | 'layer'
  | 'use'
  | 'rule'
  | 'owner'
  | 'file'
  | 'touchstone';

/** Defines a name (`declares`) or refers to one (`refers`). */
export const declares = (role: NameRole, description: string) =>
  Type.String({ description, pattern: role === 'layer' ? LAYER_PATTERN : NAME_PATTERN, 'x-declares': role });
export const refers = (
  role: NameRole,
  description: string,
  options: { default?: string; examples?: string[] } = {},
) => {
  const { default: byDefault, ...rest } = options;
  return Type.String({
    description,
    'x-refers': role,
    ...rest,
    ...(byDefault !== undefined && { 'x-default': byDefault }),
  });
};

/** A mapping that takes these keys and `x-…`, no others. `reserved` keys are known but not used in this version. */
export const mapping = <T extends Record<string, TSchema>>(
  title: string,
  description: string,
  properties: T,
  options: Record<string, unknown> = {},
) =>
  Type.Object(properties, {
    title,
    description,
    additionalProperties: false,
    patternProperties: { '^x-': {} },
    ...options,
  });

/**
 * A mapping from names of one's own to one schema. Keys that begin with `x-` are kept and ignored, here too.
 * @param role what the names declare; without it any text is a name
 */
export const named = <T extends TSchema>(
  role: NameRole | undefined,
  description: string,
  entry: T,
  options: Record<string, unknown> = {},
) =>
  Type.Unsafe<Record<string, Static<T>>>({
    type: 'object',
    description,
    patternProperties: { '^(?!x-)': entry },
    ...(role && { propertyNames: { pattern: NAME_PATTERN }, 'x-declares-keys': role }),
    ...options,
  });
