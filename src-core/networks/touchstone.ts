import { show } from '../quantity/show';
import type { TextRange } from '../text/types';
import { toScattering } from './to-scattering';
import { defaultOptions, type OptionLine, readOptionLine } from './touchstone-option-line';
import { touchstoneQuality } from './touchstone-quality';
import { type Scanner, scanTouchstone } from './touchstone-scan';
import type { TouchstoneData, TouchstoneError, TouchstoneResult } from './touchstone-types';

/** Limits of what is read (design section 8). */
export const touchstoneLimits = { characters: 64 * 2 ** 20, points: 100_000, ports: 4 } as const;
/** No network of passive or even amplifying parts comes near; beyond lies a slip of unit or format. */
const largestMagnitude = 1e6;

/**
 * Reads a Touchstone file of version 1.0 or 1.1 with one to four ports: S, Y, Z and, of two ports, G and H; RI, MA, DB; Hz to GHz;
 * comments anywhere, rows wrapped anyhow (numbers are counted, not lines), one resistance for all ports or one a port. A two-port's
 * noise data are passed over. It never throws: what is wrong is in `errors`, with its range.
 * @param fileName whose ending `.sNp` says how many ports; without it they are counted
 * Source: Touchstone 1.1, IBIS Open Forum 2002. Check values F-01 to F-14.
 */
export function readTouchstone(text: string, fileName: string): TouchstoneResult {
  const reading = { text, scanner: scanTouchstone(text), errors: [] as TouchstoneError[] };
  if (text.length > touchstoneLimits.characters) {
    return {
      errors: [
        {
          line: 1,
          range: { start: 0, end: 0 },
          message: 'The file is larger than the 64 MiB that are read.',
          rule: 'limit',
        },
      ],
    };
  }
  const ports = portCount(text, fileName);
  if (ports === undefined || ports > touchstoneLimits.ports) {
    const message =
      ports === undefined
        ? 'How many ports the file has shows neither in its name (`.s2p`, `.s4p`) nor in its rows.'
        : `The file has ${ports} ports; 1 to ${touchstoneLimits.ports} are read.`;
    const rule = ports === undefined ? {} : { rule: 'limit' as const };
    return { errors: versionError(reading) ?? [{ line: 1, range: firstLine(text), message, ...rule }] };
  }
  const data = readData(reading, ports);
  return { data, errors: reading.errors };
}

interface Reading {
  readonly text: string;
  readonly scanner: Scanner;
  readonly errors: TouchstoneError[];
}

/** Frequencies and parameters; stops at the first fault of the data, whose numbers could no longer be told apart after it. */
function readData(reading: Reading, ports: number): TouchstoneData | undefined {
  const { text, scanner, errors } = reading;
  const perPoint = 1 + 2 * ports * ports;
  let options: OptionLine | undefined;
  let values = new Float64Array(64 * perPoint);
  let count = 0;
  let recordStart: TextRange = { start: 0, end: 0 };
  let recordLine = 1;
  /** Where the data begin, if no option line stands before. */
  let begins: Pick<TouchstoneError, 'line' | 'range'> | undefined;
  const fail = (
    message: string,
    range: TextRange = { start: scanner.start, end: scanner.end },
    line = scanner.line,
    rule?: 'limit',
  ) => {
    errors.push({ line, range, message, ...(rule && { rule }) });
    return undefined;
  };

  while (scanner.next()) {
    const code = text.charCodeAt(scanner.start);
    if (scanner.firstOfLine && code === 35 /* # */) {
      const read = optionsHere(reading, ports);
      if (read === undefined) return undefined;
      options ??= read; // only the first option line counts
      continue;
    }
    if (code === 91 /* [ */) return fail(version2Message);
    if (!options) {
      options = defaultOptions;
      begins = { line: scanner.line, range: { start: scanner.start, end: scanner.end } };
    }
    const value = numberAt(text, scanner.start, scanner.end);
    if (value === undefined) return fail(`\`${shown(text, scanner)}\` is not a number.`);
    if (count % perPoint === 0) {
      const last = count > 0 ? values[count - perPoint] : -1;
      if (!scanner.firstOfLine) {
        return fail(
          `${perPoint} numbers make a frequency of ${ports} ports, and the next begins a new line; here stands one too many, or one is missing before.`,
        );
      }
      if (value < 0) return fail('A frequency below 0 has no meaning.');
      if (value <= last && ports === 2) break; // noise data begin where the frequency falls (F-08)
      if (value <= last) return fail('The frequencies have to rise; this one does not.');
      if (count / perPoint >= touchstoneLimits.points)
        return fail(
          `The file has more than the ${show.count(touchstoneLimits.points, 'frequency', 'frequencies')} that are read.`,
          undefined,
          undefined,
          'limit',
        );
      recordStart = { start: scanner.start, end: scanner.end };
      recordLine = scanner.line;
    }
    if (count === values.length) values = grown(values);
    values[count++] = value;
  }

  const left = count % perPoint;
  if (left > 0) {
    return fail(
      `The last frequency has ${left} of the ${perPoint} numbers that ${ports} ports need.`,
      { start: recordStart.start, end: scanner.end },
      recordLine,
    );
  }
  if (count === 0) return fail('The file holds no data.', firstLine(text), 1);
  // said only of data that are taken: what no one can read has one fault
  if (begins) {
    const message = 'The data begin without an option line such as `# GHz S MA R 50`; those values are taken.';
    errors.push({ ...begins, message });
  }
  return toData(values.subarray(0, count), ports, options ?? defaultOptions, fail);
}

function optionsHere(reading: Reading, ports: number): OptionLine | undefined {
  const { text, scanner, errors } = reading;
  const { start, line } = scanner;
  const glued = text.slice(start + 1, scanner.end); // `#GHz` without a blank
  const { words, end } = scanner.restOfLine();
  const { options, problem } = readOptionLine(glued ? [glued, ...words] : words, ports);
  if (problem === undefined) return options;
  errors.push({ line, range: { start, end }, message: problem });
  return undefined;
}

function toData(
  values: Float64Array,
  ports: number,
  options: OptionLine,
  fail: (message: string, range: TextRange, line: number) => undefined,
): TouchstoneData | undefined {
  const perPoint = 1 + 2 * ports * ports;
  const points = values.length / perPoint;
  const frequencies = new Float64Array(points);
  const s = new Float64Array(points * (perPoint - 1));
  for (let i = 0; i < points; i++) {
    frequencies[i] = values[i * perPoint] * options.unitHz;
    const matrix = s.subarray(i * (perPoint - 1), (i + 1) * (perPoint - 1));
    for (let k = 0; k < matrix.length; k += 2)
      complexPair(values[i * perPoint + 1 + k], values[i * perPoint + 2 + k], options.format, matrix, k);
    if (ports === 2) swapOrder(matrix); // N11 N21 N12 N22 (F-05)
    toScattering(matrix, ports, options.parameter);
    for (let k = 0; k < matrix.length; k++) {
      if (Math.abs(matrix[k]) <= largestMagnitude) continue; // false for NaN too
      return fail(
        `The numbers of frequency ${i + 1} give no scattering parameters of a real network: is the format really ${options.format}?`,
        { start: 0, end: 0 },
        1,
      );
    }
  }
  const ohms = options.referenceOhms;
  const referenceOhms = ohms.length === ports ? ohms : Array.from({ length: ports }, () => ohms[0]);
  return { ports, referenceOhms, frequencies, s, quality: touchstoneQuality({ ports, frequencies, s }) };
}

/** A pair of numbers of a format as re and im, at `at` in `out`. Check value F-03. */
export function complexPair(
  first: number,
  second: number,
  format: OptionLine['format'],
  out: Float64Array,
  at: number,
): void {
  if (format === 'RI') {
    out[at] = first;
    out[at + 1] = second;
    return;
  }
  const magnitude = format === 'DB' ? 10 ** (first / 20) : first;
  const angle = (second * Math.PI) / 180;
  out[at] = magnitude * Math.cos(angle);
  out[at + 1] = magnitude * Math.sin(angle);
}

function swapOrder(matrix: Float64Array): void {
  const [re, im] = [matrix[2], matrix[3]];
  matrix[2] = matrix[4];
  matrix[3] = matrix[5];
  matrix[4] = re;
  matrix[5] = im;
}

function numberAt(text: string, start: number, end: number): number | undefined {
  for (let i = start; i < end; i++) {
    const code = text.charCodeAt(i);
    const allowed =
      (code >= 48 && code <= 57) || code === 46 || code === 43 || code === 45 || code === 69 || code === 101;
    if (!allowed) return undefined;
  }
  const value = Number(text.slice(start, end));
  return Number.isFinite(value) ? value : undefined;
}

function grown(values: Float64Array): Float64Array<ArrayBuffer> {
  const larger = new Float64Array(2 * values.length);
  larger.set(values);
  return larger;
}

/** From the name; failing that from the first frequency's numbers: a frequency begins a line of an odd count, what continues it is even (F-06). */
function portCount(text: string, fileName: string): number | undefined {
  const named = /\.s(\d{1,3})p$/i.exec(fileName);
  if (named) return Number(named[1]) || undefined;
  const scanner = scanTouchstone(text);
  let numbers = 0;
  while (scanner.next()) {
    if (text.charCodeAt(scanner.start) === 35) {
      scanner.restOfLine();
      continue;
    }
    const inLine = 1 + scanner.restOfLine().words.length;
    if (numbers > 0 && inLine % 2 === 1) break;
    numbers += inLine;
  }
  const ports = Math.sqrt((numbers - 1) / 2);
  return Number.isInteger(ports) && ports > 0 ? ports : undefined;
}

const version2Message =
  'The file is of Touchstone version 2 (it has keywords in brackets); 2.0 is not read in this version. Export it as version 1.1.';

function versionError({ text }: Reading): TouchstoneError[] | undefined {
  const scanner = scanTouchstone(text);
  while (scanner.next()) {
    if (text.charCodeAt(scanner.start) !== 91) continue;
    return [{ line: scanner.line, range: { start: scanner.start, end: scanner.end }, message: version2Message }];
  }
  return undefined;
}

function firstLine(text: string): TextRange {
  const end = text.search(/[\r\n]/);
  return { start: 0, end: end < 0 ? text.length : end };
}

const shown = (text: string, { start, end }: Scanner) => text.slice(start, Math.min(end, start + 40));
