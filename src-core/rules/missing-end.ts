import { quoted } from '../model/reports';
import { isMapping } from '../raw';
import type { Fix } from '../report';
import { limitName } from './places';
import type { Judged, Rule } from './types';

const missing = ({ transmitter, receiver }: Judged['model']) => [
  ...(transmitter?.swingVolts === undefined ? (['transmitter'] as const) : []),
  ...(receiver === undefined ? (['receiver'] as const) : []),
];

/** Written, though not so that it can be read: the finding at its place says all. */
function isWritten({ model, parsed }: Judged, end: 'transmitter' | 'receiver'): boolean {
  const root = parsed.get(model.file)?.value;
  const written = isMapping(root) ? root[end] : undefined;
  if (end === 'transmitter' && model.transmitter) return isMapping(written) && Object.hasOwn(written, 'swing');
  return written !== undefined && written !== null;
}

const ROOT_TEXT = { transmitter: '{ swing: 800 mV }', receiver: '{ impedance: 100 ohm }' } as const;

function fixFor({ model }: Judged, end: 'transmitter' | 'receiver'): Fix {
  if (end === 'transmitter' && model.transmitter) {
    return {
      title: 'Add a swing of 800 mV',
      edits: [{ op: 'set', at: model.transmitter.place, key: 'swing', text: '800 mV' }],
    };
  }
  return {
    title: `Add a ${end}`,
    edits: [{ op: 'set', at: { file: model.file, path: [] }, key: end, text: ROOT_TEXT[end] }],
  };
}

export const missingEnd: Rule = {
  name: 'missing-end',
  severity: 'error',
  reads: 'model',
  options: {},
  doc: `A limit asks for the eye, and the channel does not say what drives the path (\`transmitter\` with its \`swing\`) or what it ends in
(\`receiver\`): the eye cannot be judged. Without a limit on the eye neither is needed.`,
  bad: 'receiver: null',
  good: 'receiver: { noise: 2 mV }',
  *check(judged) {
    const { model } = judged;
    const limit = model.limits.find(({ kind }) => kind === 'eye');
    if (!limit || !model.computable) return;
    for (const end of missing(model)) {
      if (isWritten(judged, end)) continue;
      const what = end === 'transmitter' && model.transmitter ? 'the `swing` of the transmitter' : `a \`${end}\``;
      yield {
        at: limitName(limit),
        subject: limit.name,
        message: `The eye of ${quoted(limit.name)} needs ${what}, which the channel does not have.`,
        fixes: [fixFor(judged, end)],
      };
    }
  },
};
