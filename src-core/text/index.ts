export { parseFile } from './parse';
export { rangeOf } from './range';
