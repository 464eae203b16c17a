import type { PageState } from './messages';

const isRecord = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
const isText = (value: unknown): value is string => typeof value === 'string' && value.length < 4096;
const isRange = (value: unknown): value is [number, number] =>
  Array.isArray(value) &&
  value.length === 2 &&
  value.every((part) => typeof part === 'number' && Number.isFinite(part));

/** What an earlier page kept, as far as it makes sense; anything else is left out. */
export function readState(kept: unknown): PageState {
  if (!isRecord(kept)) return {};
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
  if (!isRecord(value)) return {};
  return Object.fromEntries(
    Object.entries(value).flatMap(([name, zoom]) => {
      if (!isRecord(zoom)) return [];
      const ranges = { ...(isRange(zoom.x) && { x: zoom.x }), ...(isRange(zoom.y) && { y: zoom.y }) };
      return Object.keys(ranges).length > 0 ? [[name, ranges]] : [];
    }),
  );
}
