import { isMapping } from '../../src-core/raw';
import type { PageState } from './messages';

const isText = (value: unknown): value is string => typeof value === 'string' && value.length < 4096;
const isRange = (value: unknown): value is [number, number] =>
  Array.isArray(value) &&
  value.length === 2 &&
  value.every((part) => typeof part === 'number' && Number.isFinite(part));

/** What an earlier page kept, as far as it makes sense; anything else is left out. */
export function readState(kept: unknown): PageState {
  if (!isMapping(kept)) return {};
  const { uri, selected, tables, scrollTop } = kept;
  return {
    ...(isText(uri) && { uri }),
    ...(isText(selected) && { selected }),
    zooms: readZooms(kept.zooms),
    tables: Array.isArray(tables) ? tables.filter(isText) : [],
    ...(typeof scrollTop === 'number' && Number.isFinite(scrollTop) && { scrollTop }),
  };
}

function readZooms(value: unknown): PageState['zooms'] {
  if (!isMapping(value)) return {};
  return Object.fromEntries(
    Object.entries(value).flatMap(([name, zoom]) => {
      if (!isMapping(zoom)) return [];
      const ranges = { ...(isRange(zoom.x) && { x: zoom.x }), ...(isRange(zoom.y) && { y: zoom.y }) };
      return Object.keys(ranges).length > 0 ? [[name, ranges]] : [];
    }),
  );
}
