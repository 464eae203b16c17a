import { fullOf, toSingleEnded } from './mixed-mode';
import type { Network, NetworkContext } from './types';

export interface WriteOptions {
  /**
   * `differential`: a two-port in the differential reference (single-ended channel: the conductor's).
   * `single-ended`: a four-port, ports 1 and 3 enter and 2 and 4 leave, positive leg first, in half of that reference.
   * `mixed`: a four-port whose ports are the differential and the common one of either side; each has its own reference.
   */
  readonly form: 'differential' | 'single-ended' | 'mixed';
  /** Lines put before the data. */
  readonly comments?: readonly string[];
}

/** A network as a Touchstone 1.1 text: hertz, S, re and im with all digits, so that reading it gives the same numbers. */
export function writeTouchstone(
  network: Network,
  context: NetworkContext,
  { form, comments = [] }: WriteOptions,
): string {
  const single = context.singleEnded || form === 'differential';
  const ohms = context.referenceOhms;
  const reference = single
    ? `${ohms}`
    : form === 'single-ended'
      ? `${ohms / 2}`
      : `${ohms} ${ohms / 4} ${ohms} ${ohms / 4}`;
  const lines = [...comments, ...portComments(context, form)].map(
    (comment) => `! ${comment.replace(/[^\x20-\x7e]+/g, ' ')}`,
  );
  lines.push(`# Hz S RI R ${reference}`);
  const rows = single
    ? twoPortRows(network.differential)
    : fourPortRows(form === 'mixed' ? fullOf(network) : bookOrder(toSingleEnded(fullOf(network))));
  context.frequencies.forEach((frequency, i) => {
    const [first, ...others] = rows(i);
    lines.push(`${frequency} ${first}`, ...others.map((row) => `  ${row}`));
  });
  return `${lines.join('\n')}\n`;
}

function portComments({ singleEnded }: NetworkContext, form: WriteOptions['form']): string[] {
  if (singleEnded) return ['Ports: 1 transmitter side, 2 receiver side'];
  if (form === 'differential') return ['Ports: 1 transmitter side, 2 receiver side, differential mode'];
  if (form === 'single-ended')
    return ['Ports: 1 and 3 transmitter side, 2 and 4 receiver side; 1 and 2 the positive leg'];
  return [
    'Ports: 1 differential and 2 common of the transmitter side, 3 differential and 4 common of the receiver side',
  ];
}

/** Two-ports are written 21 before 12. */
const twoPortRows = (s: Float64Array) => (point: number) => [
  [0, 4, 2, 6].map((at) => `${s[8 * point + at]} ${s[8 * point + at + 1]}`).join(' '),
];

const fourPortRows = (s: Float64Array) => (point: number) =>
  [0, 1, 2, 3].map((row) => Array.from(s.subarray(32 * point + 8 * row, 32 * point + 8 * row + 8)).join(' '));

/** Ports p1, n1, p2, n2 to the file's 1 = p1, 2 = p2, 3 = n1, 4 = n2. */
function bookOrder(s: Float64Array): Float64Array {
  const from = [0, 2, 1, 3];
  const out = new Float64Array(s.length);
  for (let at = 0; at < s.length; at += 32) {
    for (let row = 0; row < 4; row++) {
      for (let column = 0; column < 4; column++) {
        for (let part = 0; part < 2; part++)
          out[at + 8 * row + 2 * column + part] = s[at + 8 * from[row] + 2 * from[column] + part];
      }
    }
  }
  return out;
}
