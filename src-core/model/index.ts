export { buildModel, MAX_ELEMENTS } from './build';
