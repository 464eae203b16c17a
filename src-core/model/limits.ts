import type { LimitKindName, Quantity, QuantitySpec } from '../../schemas/format/types';
import { entryKind, kindProblems, readValues } from '../format/index';
import { readQuantity } from '../quantity/read';
import { isMapping, listAt } from '../raw';
import type { Fix } from '../report';
import { writtenKeys } from '../text/first';
import type { Place } from '../text/types';
import type { ElementContext } from './elements';
import { formatReports, type ModelReport, nameFixes, nameHint, placeIn, quoted } from './reports';
import type { AnyElement, AnyLimit, Limit, Waiver } from './types';

/** What a limit of each kind cannot do without. */
const NEEDS: Readonly<Partial<Record<LimitKindName, { readonly key: string; readonly example: string }>>> = {
  'insertion-loss': { key: 'max', example: '24 dB @ nyquist' },
  'return-loss': { key: 'min', example: '10 dB' },
};

/** The limits as read; one whose kind could not be read is left out, with a report. */
export function readLimits(context: ElementContext, elements: readonly AnyElement[]): AnyLimit[] {
  const { sources, reports } = context;
  const { file, raw: document } = sources.own;
  return listAt(document, 'limits').flatMap((entry, index) => {
    const path = ['limits', index];
    const chosen = entryKind('limits', entry);
    if (chosen.problem || !isMapping(entry)) {
      if (chosen.problem) reports.push(...formatReports([chosen.problem], file, path));
      return [];
    }
    const kind = chosen.kind as LimitKindName;
    const written = entry[kind];
    const name = typeof written === 'string' && written !== '' ? written : `${kind} ${index + 1}`;
    const { values, problems } = readValues(kind, entry, context);
    const late = kindProblems('limits', kind, writtenKeys(sources.own.parsed, path));
    reports.push(...formatReports([...late, ...problems], file, path, name));
    const place = placeIn(file, path);
    const needed = NEEDS[kind];
    if (needed && written !== null && !Object.hasOwn(entry, needed.key)) {
      reports.push({
        rule: 'schema',
        at: placeIn(file, [...path, kind], 'entry'),
        subject: name,
        message: `The limit \`${name}\` lacks \`${needed.key}\`: it limits nothing.`,
        fixes: [
          {
            title: `Add \`${needed.key}: ${needed.example}\``,
            edits: [{ op: 'set', at: place, key: needed.key, text: needed.example }],
          },
        ],
      });
    }
    const between = readBetween(
      (values as { between?: readonly string[] }).between,
      entry,
      elements,
      { ...place, path: [...path, 'between'] },
      name,
      reports,
    );
    const limit: Limit = { kind, name, index, place, values, ...(between && { between }) };
    return [limit as AnyLimit];
  });
}

function readBetween(
  between: readonly string[] | undefined,
  entry: Readonly<Record<string, unknown>>,
  elements: readonly AnyElement[],
  at: Place,
  subject: string,
  reports: ModelReport[],
): readonly [number, number] | undefined {
  if (between === undefined)
    return Object.hasOwn(entry, 'between') || elements.length === 0 ? undefined : [0, elements.length - 1];
  const names = elements.map(({ name }) => name);
  const found = between.map((name, i) => {
    const index = names.indexOf(name);
    const here: Place = { file: at.file, path: [...at.path, i] };
    if (index < 0) {
      reports.push({
        rule: 'unknown-name',
        at: here,
        subject,
        message: `There is no element ${quoted(String(name))} in \`path\`${nameHint(String(name), names, 'element')}`,
        fixes: nameFixes(here, String(name), names),
      });
    }
    return index;
  });
  const [first, last] = found;
  if (found.length !== 2 || first < 0 || last < 0) return undefined;
  if (first <= last) return [first, last];
  const text = `[${between[1]}, ${between[0]}]`;
  const fix: Fix = { title: `Change to \`${text}\``, edits: [{ op: 'value', at, text }], preferred: true };
  reports.push({
    rule: 'limit-order',
    at,
    subject,
    message: `\`${between[0]}\` stands behind \`${between[1]}\` in \`path\`; \`between\` runs from the transmitter to the receiver.`,
    fixes: [fix],
  });
  return undefined;
}

const ANY_VALUE: QuantitySpec = {
  dimensions: [
    'loss',
    'length',
    'time',
    'frequency',
    'impedance',
    'voltage',
    'unitInterval',
    'capacitance',
    'ratio',
    'lossPerLength',
  ],
  tolerance: false,
};

/** The waivers that have all they need; the others have a report. */
export function readWaivers({ sources, reports }: ElementContext): Waiver[] {
  const { file, raw: document } = sources.own;
  return listAt(document, 'waivers').flatMap((entry, index) => {
    const path = ['waivers', index];
    const chosen = entryKind('waivers', entry);
    if (chosen.problem) {
      reports.push(...formatReports([chosen.problem], file, path));
      return [];
    }
    const { values, problems } = readValues('waiver', entry);
    reports.push(...formatReports(problems, file, path));
    const { rule, at, until, by, reason } = values;
    if (!rule || !at || !until || !by || !reason) return [];
    if (!isDay(until)) {
      reports.push({
        rule: 'schema',
        at: placeIn(file, [...path, 'until']),
        message: `${quoted(until)} is not a day; write it as \`2027-03-31\`.`,
      });
      return [];
    }
    const upTo = readUpTo(values['up-to'], placeIn(file, [...path, 'up-to']), reports);
    if (upTo === 'bad') return [];
    return [{ index, place: placeIn(file, path), rule, at, ...(upTo && { upTo }), until, by, reason }];
  });
}

function readUpTo(written: string | undefined, at: Place, reports: ModelReport[]): Quantity | undefined | 'bad' {
  if (written === undefined) return undefined;
  // Some findings are shares of something; `%` is no unit of the format elsewhere.
  const [, percent] = /^(\d+(?:\.\d+)?)\s*%$/.exec(written) ?? [];
  const { quantity, problem } = readQuantity(
    percent === undefined ? written : String(Number(percent) / 100),
    ANY_VALUE,
  );
  if (quantity && !problem) return { ...quantity, text: written };
  reports.push({ rule: 'quantity', at, message: problem?.message ?? `${quoted(written)} is no quantity.` });
  return 'bad';
}

function isDay(text: string): boolean {
  if (!/^\d{4}-\d{2}-\d{2}$/.test(text)) return false;
  const time = Date.parse(`${text}T00:00:00Z`);
  return !Number.isNaN(time) && new Date(time).toISOString().startsWith(text);
}
