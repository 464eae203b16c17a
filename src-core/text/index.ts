export { parseFile } from './parse';
export type { ParsedFile } from './parsed';
export { rangeOf } from './range';
