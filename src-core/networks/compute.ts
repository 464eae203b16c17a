import type { Model } from '../model/types';
import { sameValue } from '../same-value';
import { estimatedDecay, probeFrequencies } from './decay';
import { chooseGrid, type Decay } from './grid';
import { keptRecipe, recipeBasis, recipeOf } from './recipe';
import { type Kept, openShelf } from './shelf';
import type { TouchstoneResult } from './touchstone-types';
import type { ElementNetwork, NetworkContext, Networks } from './types';

export interface NetworkOptions {
  /** While one types: a grid that still suffices is kept (see `chooseGrid`). */
  readonly keepGrid?: boolean;
  /** A decay measured on the response, where the estimate was short. */
  readonly measured?: Decay;
  /** Asked before each element; throws to give up. */
  readonly checkTime?: () => void;
}

/**
 * Stage 2: each element as a network on one grid. A network is kept by content: the element's parameters, the grid, the reference;
 * this analysis's and the last one's are held, no others.
 * @param touchstoneOf a Touchstone file by its path, as read; the same object while its text is the same
 * @returns the previous object itself if nothing of it changed
 */
export function computeNetworks(
  model: Model,
  touchstoneOf: (file: string) => TouchstoneResult | undefined,
  previous?: Networks,
  { keepGrid = false, measured, checkTime }: NetworkOptions = {},
): Networks {
  const shelf = openShelf(previous?.kept as Kept | undefined);
  const base = { referenceOhms: model.referenceOhms, singleEnded: model.signalling === 'single-ended' };
  const basis = recipeBasis(model);
  const recipesBefore = shelf.recipesFor(basis);
  const recipes = model.elements.map((element) => {
    checkTime?.();
    return keptRecipe(element, recipesBefore?.get(element.name)) ?? recipeOf(element, model, touchstoneOf);
  });

  const probing: NetworkContext = { ...base, frequencies: probeFrequencies(model.nyquistFrequency) };
  const probes = recipes.flatMap((recipe) => shelf.probe(recipe, probing, model.nyquistFrequency) ?? []);
  const estimated = estimatedDecay(model, probes);
  const decay = measured && measured.decaySeconds > estimated.decaySeconds ? measured : estimated;
  const chosen = chooseGrid(model, decay, keepGrid ? previous?.grid : undefined);
  const grid =
    previous && sameValue({ ...chosen, frequencies: 0 }, { ...previous.grid, frequencies: 0 }) ? previous.grid : chosen;

  const context: NetworkContext = { ...base, frequencies: grid.frequencies };
  const elements = recipes.map((recipe) => {
    checkTime?.();
    return shelf.element(recipe, context);
  });
  if (
    previous &&
    previous.grid === grid &&
    sameContext(previous.context, context) &&
    recipesBefore &&
    sameElements(previous.elements, elements)
  ) {
    return previous;
  }
  const failures = elements.flatMap(({ element, failure }) => (failure === undefined ? [] : [{ element, failure }]));
  const without = elements
    .filter(({ element, through }) => through && element.includedIn === undefined)
    .map(({ element }) => element.name);
  return { grid, context, elements, without, failures, kept: shelf.keep(basis, recipes), computed: shelf.computed() };
}

const sameContext = (a: NetworkContext, b: NetworkContext) =>
  a.referenceOhms === b.referenceOhms && a.singleEnded === b.singleEnded;

/** Networks by identity (they are kept by content), what is said of them by value. */
const sameElements = (a: readonly ElementNetwork[], b: readonly ElementNetwork[]) =>
  a.length === b.length &&
  a.every(
    (one, i) =>
      (one.through ? b[i].through : one.network === b[i].network) &&
      sameValue(one.element, b[i].element) &&
      sameValue(one.prepared, b[i].prepared),
  );
