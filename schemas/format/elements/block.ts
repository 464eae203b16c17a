import { declares, mapping } from '../quantity';
import { common } from './common';

export const blockElement = mapping('block', 'Any two-port or four-port, given by a Touchstone file.', {
  block: declares('element', 'Its own name.'),
  ...common,
});
