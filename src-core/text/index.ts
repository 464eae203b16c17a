export type { ParsedFile } from './parsed';
export { parseFile } from './parse';
export { rangeOf } from './range';
