import type { PreviewData } from '../../src-core/plots/preview-data';
import { isMapping } from '../../src-core/raw';
import type { Place } from '../../src-core/text/types';

/** Host to page. */
export type ToPage =
  /** `uri` of the file, for the state that survives a reload; `version` of its text. */
  | { readonly type: 'data'; readonly uri: string; readonly version: number | null; readonly data: PreviewData }
  /** What is shown belongs to an older text, wholly or (`eye`) in the figures of the eye, until the next `data`. */
  | { readonly type: 'stale'; readonly what: 'all' | 'eye' }
  /** The element in which the cursor of the text stands. */
  | { readonly type: 'cursorElement'; readonly element: string | null }
  /** The editor's theme changed; only hosts that do not set the body's class need it. */
  | { readonly type: 'theme'; readonly kind: ThemeKind }
  /** Instead of data: why there is none. */
  | { readonly type: 'nothing'; readonly reason: string };

export type ThemeKind = 'light' | 'dark' | 'high-contrast' | 'high-contrast-light';

/** Page to host. */
export type FromPage =
  | { readonly type: 'ready' }
  /** Select the lines of a place; `element` where it is one. */
  | { readonly type: 'select'; readonly at: Place; readonly element?: string }
  | { readonly type: 'save'; readonly format: 'svg' | 'csv'; readonly name: string; readonly content: string };

/** What the page keeps over a reload by `setState`, and what a host's serializer is given. */
export interface PageState {
  readonly uri?: string;
  readonly selected?: string;
  readonly zooms?: Readonly<
    Record<string, { readonly x?: readonly [number, number]; readonly y?: readonly [number, number] }>
  >;
  /** Plots whose data table is open. */
  readonly tables?: readonly string[];
  readonly scrollTop?: number;
}

const isText = (value: unknown, most = 4096): value is string => typeof value === 'string' && value.length <= most;

/** A saved picture or table is not larger than this. */
export const mostSavedCharacters = 16 * 1024 * 1024;

function isPlace(value: unknown): value is Place {
  return (
    isMapping(value) &&
    isText(value.file) &&
    Array.isArray(value.path) &&
    value.path.length <= 64 &&
    value.path.every((part) => isText(part) || Number.isInteger(part)) &&
    (value.on === undefined || value.on === 'key' || value.on === 'value' || value.on === 'entry')
  );
}

/** A message from the page as the host may trust it; undefined for anything else. */
export function readFromPage(message: unknown): FromPage | undefined {
  if (!isMapping(message)) return undefined;
  const { type, at, element, format, name, content } = message;
  if (type === 'ready') return { type };
  if (type === 'select' && isPlace(at) && (element === undefined || isText(element))) {
    return { type, at, ...(element !== undefined && { element }) };
  }
  const named = isText(name, 200) && /^[a-z][a-z0-9-]*$/.test(name);
  if (type === 'save' && (format === 'svg' || format === 'csv') && named && isText(content, mostSavedCharacters)) {
    return { type, format, name, content };
  }
  return undefined;
}

const themeKinds: readonly unknown[] = ['light', 'dark', 'high-contrast', 'high-contrast-light'];

/** A message from the host as the page may trust it: shape of the envelope; the data is the core's own. */
export function readToPage(message: unknown): ToPage | undefined {
  if (!isMapping(message)) return undefined;
  const { type } = message;
  const valid =
    (type === 'data' && isText(message.uri) && isPreviewData(message.data)) ||
    (type === 'stale' && (message.what === 'all' || message.what === 'eye')) ||
    (type === 'cursorElement' && (message.element === null || isText(message.element))) ||
    (type === 'theme' && themeKinds.includes(message.kind)) ||
    (type === 'nothing' && isText(message.reason));
  return valid ? (message as unknown as ToPage) : undefined;
}

function isPreviewData(value: unknown): value is PreviewData {
  return (
    isMapping(value) &&
    isText(value.file) &&
    isMapping(value.verdict) &&
    Array.isArray(value.plots) &&
    Array.isArray(value.findings)
  );
}
