import type { AnyElement, AnyLimit } from '../model/types';
import type { Place } from '../text/types';

/** An element's name as it stands in its entry: the place of what is said of the element as a whole. */
export const nameOf = (element: AnyElement): Place => ({
  ...element.place,
  path: [...element.place.path, element.kind],
});

/** The value of a key that is written in the entry itself, else the element's name: what a part gives is no fault of the part. */
export function keyOf(element: AnyElement, ...keys: readonly string[]): Place {
  const written = keys.find((key) => {
    const place = element.places[key];
    return place && place.file === element.place.file && place.path.length > element.place.path.length;
  });
  return written === undefined ? nameOf(element) : element.places[written];
}

/** The value that a limit sets, else its name. */
export const limitValue = (limit: AnyLimit, key: string): Place => ({
  ...limit.place,
  path: [...limit.place.path, key in limit.values ? key : limit.kind],
});

export const limitName = (limit: AnyLimit): Place => ({ ...limit.place, path: [...limit.place.path, limit.kind] });
