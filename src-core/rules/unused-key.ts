import { quoted } from '../model/reports';
import type { AnyElement } from '../model/types';
import type { Rule } from './types';

/** Keys that count beside a file: what it is, whose it is, how it is placed, which layers it reaches. */
const COUNT_BESIDE_FILE = new Set(
  'part touchstone ports includes reversed active net refdes note budget owner stackup layer from to span kind'.split(
    ' ',
  ),
);

/** A capacitor's droop is computed in closed form, from its value, whatever the file says above. */
const counts = (element: AnyElement, key: string) =>
  COUNT_BESIDE_FILE.has(key) || key === element.kind || (element.kind === 'capacitor' && key === 'value');

const isWrittenHere = ({ places, place }: AnyElement, key: string) => {
  const at = places[key];
  return at !== undefined && at.file === place.file && at.path.length > place.path.length;
};

export const unusedKey: Rule = {
  name: 'unused-key',
  severity: 'warning',
  reads: 'model',
  options: {},
  doc: `A key that counts for nothing here: beside \`touchstone\`, which takes the place of geometry and declared data, an element's own
length, impedance or loss changes no figure, though it reads as if it did. Remove it, or the file. Keys of later versions of the format
have the rule \`reserved-key\`.`,
  bad: 'path: [{ connector: mate, touchstone: thru.s4p, ports: { enter: [1, 3], leave: [2, 4] }, includes: [], delay: 60 ps }]',
  good: 'path: [{ connector: mate, touchstone: thru.s4p, ports: { enter: [1, 3], leave: [2, 4] }, includes: [] }]',
  *check({ model }) {
    for (const element of model.elements) {
      if (!element.file) continue;
      for (const key of Object.keys(element.values)) {
        if (counts(element, key) || !isWrittenHere(element, key)) continue;
        const at = element.places[key];
        yield {
          at: { ...at, on: 'key' },
          subject: element.name,
          message: `\`${key}\` of ${quoted(element.name)} counts for nothing: its file takes the place of it.`,
          tags: ['unnecessary'],
          fixes: [
            {
              title: `Remove \`${key}\``,
              edits: [{ op: 'remove', at: { ...at, on: 'entry' } }],
              preferred: true,
              safe: true,
            },
          ],
        };
      }
    }
  },
};
