import type { ElementKindName, Quantity } from '../../schemas/format/types';
import type { FilePath, Place } from '../text/types';
import type { AnyElement, Element, FileReference, Stackup } from './types';

/** An element while the model is being built; the steps fill it in, in order. */
export interface Draft {
  kind: ElementKindName;
  name: string;
  index: number;
  place: Place;
  values: Record<string, unknown>;
  places: Record<string, Place>;
  stackup?: Stackup;
  layer?: string;
  from?: string;
  to?: string;
  derived: Record<string, string>;
  fileReference?: FileReference;
  includedIn?: string;
  incomplete: boolean;
  /** What it is could not be read: it says nothing of layers. */
  unknownKind: boolean;
  /** It names a part that could not be read. */
  partUnread: boolean;
  /** Its own keys as written, its part's left out. */
  raw: Readonly<Record<string, unknown>>;
  /** File of each key's value: names in it are looked up there. */
  sourceOf: (key: string) => FilePath;
}

/** The element's first line: its kind and name. */
export const headOf = (draft: Draft): Place => ({
  file: draft.place.file,
  path: [...draft.place.path, draft.kind],
  on: 'entry',
});

export function finish(draft: Draft): AnyElement {
  const {
    kind,
    name,
    index,
    place,
    values,
    places,
    stackup,
    layer,
    from,
    to,
    derived,
    fileReference,
    includedIn,
    incomplete,
  } = draft;
  const budget = values.budget as Quantity | undefined;
  const owner = values.owner as string | undefined;
  const element: Element = {
    kind,
    name,
    index,
    place,
    values,
    places,
    ...(stackup && { stackup }),
    ...(layer !== undefined && { layer }),
    ...(from !== undefined && { from }),
    ...(to !== undefined && { to }),
    derived,
    ...(fileReference && { file: fileReference }),
    ...(includedIn !== undefined && { includedIn }),
    reversed: values.reversed === true,
    active: values.active === true,
    ...(budget && { budget }),
    ...(owner !== undefined && { owner }),
    incomplete,
  };
  return element as AnyElement;
}
