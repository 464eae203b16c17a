import type { Position, Range } from 'vscode-languageserver';
import { elementAt } from '../../src-core/assist/outline';
import { previewData } from '../../src-core/plots/preview-data';
import { rangeOf } from '../../src-core/text/index';
import type { Place } from '../../src-core/text/types';
import { toRange } from '../convert';
import { type Handler, located } from '../handler';

/** All that the preview shows, of the newest text, the eye included. */
export const preview: Handler<{ uri: string }, { uri: string; version: number | null; data: unknown } | null> =
  (services) =>
  async ({ uri }, token) => {
    const at = await located(services, uri, token, undefined, 'link');
    return at ? { uri, version: at.version, data: previewData(at.analysis) } : null;
  };

/** Where a place stands now, for a click in the preview. The whole entry: its lines are to be selected. */
export const rangeOfPlace: Handler<{ uri: string; place: Place }, { uri: string; range: Range } | null> =
  (services) =>
  async ({ uri, place }, token) => {
    const at = await located(services, uri, token, undefined, 'model');
    const parsed = at?.analysis.parsed.get(place.file);
    if (!at || !parsed) return null;
    const on =
      typeof place.path.at(-1) === 'number' && (place.on === undefined || place.on === 'value') ? 'entry' : place.on;
    return {
      uri: services.documents.uriOf({ root: at.root, file: place.file }),
      range: toRange(parsed.text, rangeOf(parsed, { ...place, on })),
    };
  };

export const elementAtPosition: Handler<{ uri: string; position: Position }, { element: string | null }> =
  (services) =>
  async ({ uri, position }, token) => {
    const at = await located(services, uri, token, position, 'model');
    return { element: (at && elementAt(at.analysis, at.offset)) ?? null };
  };
