import type { Dimension, NameRole } from './quantity';

/** How a quantity is read: the value of the keyword `x-quantity`. */
export interface QuantitySpec {
  /** The first is the usual one; `valid` and `plausible` are in its SI unit. */
  readonly dimensions: readonly Dimension[];
  /** Default `never`. `nyquist`: optional, and `@ nyquist` is allowed too. */
  readonly at?: 'never' | 'optional' | 'required' | 'nyquist';
  /** Default true. */
  readonly tolerance?: boolean;
  readonly valid?: readonly [number, number];
  readonly plausible?: readonly [number, number];
  /** One quantity or a list of them, read as a list. */
  readonly list?: boolean;
  /** `50 MHz to 12 GHz` */
  readonly band?: boolean;
}

/** A node of our JSON Schemas: only the keywords that they use. */
export interface NodeSchema {
  readonly title?: string;
  readonly description?: string;
  readonly examples?: readonly unknown[];
  readonly type?: string | readonly string[];
  readonly properties?: Readonly<Record<string, NodeSchema>>;
  readonly patternProperties?: Readonly<Record<string, NodeSchema>>;
  readonly propertyNames?: NodeSchema;
  readonly additionalProperties?: boolean | NodeSchema;
  readonly required?: readonly string[];
  readonly minProperties?: number;
  readonly maxProperties?: number;
  /** Two keys that say the same thing. */
  readonly not?: { readonly required: readonly string[] };
  readonly items?: NodeSchema;
  readonly minItems?: number;
  readonly maxItems?: number;
  readonly anyOf?: readonly NodeSchema[];
  readonly const?: unknown;
  readonly enum?: readonly unknown[];
  readonly pattern?: string;
  readonly minimum?: number;
  readonly maximum?: number;
  readonly 'x-quantity'?: QuantitySpec;
  readonly 'x-default'?: string;
  readonly 'x-declares'?: NameRole;
  readonly 'x-declares-keys'?: NameRole;
  readonly 'x-refers'?: NameRole;
  readonly 'x-entries'?: string;
}
