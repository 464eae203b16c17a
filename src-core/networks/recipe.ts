import { elementKinds } from '../elements/index';
import type { AnyElement, Model } from '../model/types';
import { sameValue } from '../same-value';
import { straightThrough } from './through';
import { prepareFile } from './touchstone-element';
import type { TouchstoneResult } from './touchstone-types';
import type { Network, NetworkContext, Prepared } from './types';

/** How to make an element's network on any frequencies, and the key of what that depends on. */
export interface Recipe {
  readonly element: AnyElement;
  readonly prepared?: Prepared;
  /** Absent for a straight through in place of the element. */
  readonly key?: string;
  readonly evaluate: (context: NetworkContext) => Network;
  /** What a kind's code threw, which it never should. */
  readonly failure?: unknown;
}

/** What of the model an element's recipe may depend on, beside the element itself: never on other elements. */
export function recipeBasis({
  symbolRate,
  signalling,
  referenceOhms,
  temperatureCelsius,
  transmitter,
  receiver,
}: Model): unknown {
  return { symbolRate, signalling, referenceOhms, temperatureCelsius, transmitter, receiver };
}

/**
 * The recipe of before, if the element says the same: solving a geometry for its width is the dearest part of an edit. An element that moved
 * in the path keeps its recipe too, unless that holds notes, which name places.
 */
export function keptRecipe(element: AnyElement, before: Recipe | undefined): Recipe | undefined {
  if (!before || before.failure !== undefined || element.file) return undefined;
  const moved = before.element.index !== element.index;
  if (moved && before.prepared?.notes.length) return undefined;
  return sameValue(withoutPlace(before.element, moved), withoutPlace(element, moved))
    ? { ...before, element }
    : undefined;
}

const withoutPlace = (element: AnyElement, moved: boolean) =>
  moved ? { ...element, index: 0, place: 0, places: 0 } : element;

/** A straight through for what is incomplete or already held by a neighbour's file; else the element's kind, or its file. */
export function recipeOf(
  element: AnyElement,
  model: Model,
  touchstoneOf: (file: string) => TouchstoneResult | undefined,
): Recipe {
  const through: Recipe = { element, evaluate: straightThrough };
  if (element.incomplete || element.includedIn !== undefined) return through;
  try {
    if (element.file) {
      const file = prepareFile(element, model, touchstoneOf(element.file.file));
      return file.evaluate ? { element, ...file, evaluate: file.evaluate } : { ...through, prepared: file.prepared };
    }
    const kind = elementKinds[element.kind];
    const prepared = kind.prepare(element, { model, touchstone: touchstoneOf });
    if (!prepared) return through;
    const { parameters } = prepared;
    const key = `${element.kind} ${JSON.stringify(parameters)}`;
    return { element, prepared, key, evaluate: (context) => kind.network(parameters, context) };
  } catch (failure) {
    return { ...through, failure };
  }
}
