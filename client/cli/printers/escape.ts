import { plain } from './plain';

const HALF_OR_NONE = /[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]|[\ufffe\uffff]/g;
const asEscape = (character: string) => `\\u${character.charCodeAt(0).toString(16)}`;

/**
 * Text from a file as any report may hold it: what steers a terminal or a build's log, turns the writing direction, or is no
 * character at all (half a surrogate pair, U+FFFE, U+FFFF: XML 1.0 has none of them) is made visible.
 */
export const visible = (text: string) => plain(text).replace(HALF_OR_NONE, asEscape);

const XML: Readonly<Record<string, string>> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&apos;' };

/** For an attribute's value or an element's text; `]]>` cannot end anything, since its `>` is escaped too. */
export const xml = (text: string) => visible(text).replace(/[&<>"']/g, (character) => XML[character]);

/** A path as the relative URI of a report: `lanes/a%20b.channel.yaml`. No segment can become a scheme, a query or a fragment. */
export const relativeUri = (file: string) =>
  file
    .split('/')
    .map((segment) => encodeURIComponent(segment.replace(HALF_OR_NONE, asEscape)))
    .join('/');

/**
 * A value as one JSON text whose strings hold nothing that steers a terminal or turns the writing direction: such characters are
 * written as escapes, so that a reader of the JSON still gets each of them.
 */
export const inertJson = (value: unknown) =>
  JSON.stringify(value, null, 1).replace(
    /[\u007f-\u009f\u061c\u200e\u200f\u2028\u2029\u202a-\u202e\u2066-\u2069\ufeff]/g,
    (character) => `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`,
  );
