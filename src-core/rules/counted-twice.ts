import { quoted } from '../model/reports';
import type { AnyElement } from '../model/types';
import type { Fix } from '../report';
import { nameOf } from './places';
import type { Rule } from './types';

const mayHoldVias = (element: AnyElement) =>
  (element.kind === 'connector' || element.kind === 'block') && element.file !== undefined;

const decided = ({ values }: AnyElement) => values.includes !== undefined;

function fixesFor(holder: AnyElement, vias: readonly AnyElement[]): readonly Fix[] {
  const list = vias.map(({ name }) => name).join(', ');
  const set = (text: string) => [{ op: 'set', at: holder.place, key: 'includes', text, after: holder.kind }] as const;
  return [
    { title: `The file holds ${list}: \`includes: [${list}]\``, edits: set(`[${list}]`) },
    { title: 'The file holds no neighbour: `includes: []`', edits: set('[]') },
  ];
}

export const countedTwice: Rule = {
  name: 'counted-twice',
  severity: 'warning',
  reads: 'model',
  options: {},
  doc: `A via stands beside a connector or block that is given by a file. Such files often hold the footprint's via already, and it would
count twice: too much loss, a second notch. Say which: \`includes: [NAME]\` makes the via a straight through, while its layers still
count; \`includes: []\` says that the file holds no neighbour. Only the one who made the file knows.`,
  bad: 'path: [{ connector: mate, touchstone: thru.s4p, ports: { enter: [1, 3], leave: [2, 4] } }]',
  good: 'path: [{ connector: mate, includes: [rise], touchstone: thru.s4p, ports: { enter: [1, 3], leave: [2, 4] } }]',
  *check({ model: { elements } }) {
    for (const [i, holder] of elements.entries()) {
      if (!mayHoldVias(holder) || decided(holder)) continue;
      const vias = [elements[i - 1], elements[i + 1]].filter(
        (one) => one?.kind === 'via' && one.includedIn === undefined,
      );
      if (vias.length === 0) continue;
      const names = vias.map(({ name }) => `${quoted(name)}`).join(' and ');
      yield {
        at: nameOf(holder),
        subject: holder.name,
        message: `Is ${names} counted twice? The file of ${quoted(holder.name)} may hold ${vias.length > 1 ? 'them' : 'it'} already; \`includes\` says so.`,
        related: vias.map((via) => ({ at: nameOf(via), message: `${quoted(via.name)} is computed here.` })),
        fixes: fixesFor(holder, vias),
      };
    }
  },
};
