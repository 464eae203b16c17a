import type { ElementKindName } from '../../schemas/format/types';
import type { ElementKind } from '../networks/types';
import { blockKind } from './block';
import { cableKind } from './cable';
import { capacitorKind } from './capacitor';
import { connectorKind } from './connector';
import { packageKind } from './package';
import { reversible } from './reversal';
import { stubKind } from './stub';
import { traceKind } from './trace';
import { viaKind } from './via';

/** The eight kinds. A new kind is its file, its schema and a line here. */
export const elementKinds: Record<ElementKindName, ElementKind> = {
  package: reversible(packageKind) as ElementKind,
  trace: reversible(traceKind) as ElementKind,
  cable: reversible(cableKind) as ElementKind,
  via: viaKind as ElementKind, // its ends are the layers of its neighbours, whichever way it is placed
  connector: reversible(connectorKind) as ElementKind,
  capacitor: reversible(capacitorKind) as ElementKind,
  stub: reversible(stubKind) as ElementKind,
  block: reversible(blockKind) as ElementKind,
};
