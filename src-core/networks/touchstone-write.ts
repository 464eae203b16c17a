import { fullOf, toSingleEnded } from './mixed-mode';
import type { Network, NetworkContext } from './types';

export interface WriteOptions extends NetworkContext {
  /**
   * `legs`, what a pair takes if nothing is said: a four-port, ports 1 and 3 enter, 2 and 4 leave, 1 and 2 the positive leg, in half of the
   * differential reference. `differential`: a two-port of that mode alone. `modes`: a four-port whose ports are the differential
   * and the common one of either side, each with its own reference. A single-ended channel is always a two-port.
   */
  readonly form?: 'legs' | 'differential' | 'modes';
  /** Put before the data. */
  readonly comment?: string;
}

/** A network as a Touchstone 1.1 text: hertz, S, re and im with all digits, so that reading it gives the same numbers. */
export function writeTouchstone(network: Network, options: WriteOptions): string {
  const { frequencies, referenceOhms: ohms, singleEnded, comment } = options;
  const form = singleEnded ? 'differential' : (options.form ?? 'legs');
  const lines = [...(comment === undefined ? [] : comment.split(/[\r\n]+/)), portComment(singleEnded, form)];
  // The format knows printable ASCII alone.
  const text = lines.map((line) => `! ${line.replace(/[^\x20-\x7e]+/g, '?')}`);
  text.push(`# Hz S RI R ${references(ohms, form)}`);
  const rows = rowsOf(network, form);
  for (let i = 0; i < frequencies.length; i++) text.push(`${frequencies[i]} ${rows(i)}`);
  return `${text.join('\n')}\n`;
}

type Form = NonNullable<WriteOptions['form']>;

function references(ohms: number, form: Form): string {
  if (form === 'legs') return `${ohms / 2}`;
  return form === 'differential' ? `${ohms}` : `${ohms} ${ohms / 4} ${ohms} ${ohms / 4}`;
}

function rowsOf(network: Network, form: Form): (point: number) => string {
  if (form === 'differential') return twoPortRow(network.differential);
  return fourPortRows(form === 'modes' ? fullOf(network) : bookOrder(toSingleEnded(fullOf(network))));
}

function portComment(singleEnded: boolean, form: Form): string {
  if (singleEnded) return 'Ports: 1 transmitter side, 2 receiver side';
  if (form === 'differential') return 'Ports: 1 transmitter side, 2 receiver side, differential mode';
  if (form === 'legs') return 'Ports: 1 and 3 transmitter side, 2 and 4 receiver side; 1 and 2 the positive leg';
  return 'Ports: 1 differential and 2 common of the transmitter side, 3 differential and 4 common of the receiver side';
}

/** A two-port is written 21 before 12. */
const twoPortRow = (s: Float64Array) => (point: number) =>
  [0, 4, 2, 6].map((at) => `${s[8 * point + at]} ${s[8 * point + at + 1]}`).join(' ');

/** Each row of the matrix on its own line. */
const fourPortRows = (s: Float64Array) => (point: number) =>
  [0, 1, 2, 3]
    .map((row) => Array.from(s.subarray(32 * point + 8 * row, 32 * point + 8 * row + 8)).join(' '))
    .join('\n  ');

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
