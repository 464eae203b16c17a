/**
 * The format at run time: what keys there are, what is wrong with a value, and the value as read.
 *
 * - `entryKind(list, entry)` chooses an entry's schema; `kindProblems(list, kind, keys)` says that the kind does not stand first; `freeName(kind, taken)` proposes an own name.
 * - `readValues(schema, raw, options)` checks a mapping against its schema and reads its quantities. Keys that are bad are left
 *   out of `values` and have a problem, the others are kept.
 * - `missingKeys(kind, values, singleEnded)`, after a part was merged in: what the kind's model needs and is not there.
 *   Of an entry whose own name is missing say that alone.
 * - `reportOf(problem, { file, path })` turns a problem, whose paths are relative to the entry, into a `Report` at a place.
 * - `keysAt`, `keySchemaAt`, `keysOf`: descriptions for hover and completion.
 *
 * Every function takes anything that YAML can make and returns; none throws.
 */
export { entryKind, kindProblems, likelyKinds } from './entry-kind';
export { freeName } from './free-name';
export { type KeyInfo, keySchemaAt, keysAt, keysOf } from './keys';
export { missingKeyProblems, missingKeys } from './missing';
export { type FormatProblem, reportOf } from './problem';
export { readValues } from './read';
