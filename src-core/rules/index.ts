export { acceptanceOf, addWaivers } from './add-waivers';
export { rulesReference } from './build';
export { readConfig } from './config';
export { configOf, judge, MOST_FINDINGS } from './judge';
export { rules } from './list';
