/** Types of values as read; the single place that src-core imports them from. */
export type { ReceiverValues, TransmitterValues } from './channel';
export type { SeveritySetting } from './config';
export type { ElementKindName, ElementValues } from './elements/index';
export type { EntryListName, SchemaName } from './index';
export type { LimitKindName, LimitValues } from './limits';
export type { NodeSchema, QuantitySpec } from './node';
export type {
  DrillRulesValues,
  FoilValues,
  MaterialValues,
  PartsValues,
} from './parts';
export type { Band, Dimension, NameRole, Quantity } from './quantity';
export type { ValuesOf } from './values';
