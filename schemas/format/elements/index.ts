import type { Static } from '@sinclair/typebox';
import { blockElement } from './block';
import { cableElement } from './cable';
import { capacitorElement } from './capacitor';
import { connectorElement } from './connector';
import { packageElement } from './package';
import { stubElement } from './stub';
import { traceElement } from './trace';
import { viaElement } from './via';

/** The eight kinds. A new kind is its file and a line here. */
export const elementSchemas = {
  package: packageElement,
  trace: traceElement,
  cable: cableElement,
  via: viaElement,
  connector: connectorElement,
  capacitor: capacitorElement,
  stub: stubElement,
  block: blockElement,
};

export type ElementKindName = keyof typeof elementSchemas;
/** An element's keys as read: quantities parsed, part merged. */
export type ElementValues = { [K in ElementKindName]: Static<(typeof elementSchemas)[K]> };
