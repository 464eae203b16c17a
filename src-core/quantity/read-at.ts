import type { QuantitySpec } from '../../schemas/format/types';
import { type Outcome, problem, type QuantityFix, quoted, replaced } from './problem';
import type { QuantityContext } from './read';
import { type Cursor, isAtEnd, scanNumber, scanUnit, skipSpace, take } from './scan';
import { exactly } from './show';
import { fittingUnits, unknownUnit, withUnit } from './unit-problems';
import { inSi, unitNamed, wanted } from './units';

/** Between these a frequency may lie. */
const FREQUENCIES = [1, 1e13] as const;

/** `@ 12.9 GHz`, `@ nyquist` or nothing, as the specification wants it. */
export function readAt(
  cursor: Cursor,
  spec: QuantitySpec,
  context: QuantityContext,
  quantityStart: number,
): Outcome<number | 'nyquist' | undefined> {
  const { text } = cursor;
  const allowed = spec.at ?? 'never';
  skipSpace(cursor);
  const start = cursor.at;
  if (!take(cursor, '@'))
    return allowed === 'required' && isAtEnd(cursor) ? missing(cursor, context, quantityStart) : { ok: undefined };
  const read = readFrequency(cursor, spec, context, start);
  if ('problem' in read || allowed !== 'never') return read;
  const fixed = `${text.slice(0, start).trimEnd()}${text.slice(cursor.at)}`;
  return problem(
    'at-not-allowed',
    `No frequency is written here: remove ${quoted(text.slice(start, cursor.at))}.`,
    start,
    cursor.at,
    [{ title: `Remove ${quoted(text.slice(start, cursor.at))}`, text: fixed }],
  );
}

function missing({ text }: Cursor, { nyquistHz }: QuantityContext, quantityStart: number) {
  const example = nyquistHz === undefined ? '12.9 GHz' : exactly(nyquistHz, 'frequency');
  const written = text.trim();
  const fixes: QuantityFix[] =
    nyquistHz === undefined ? [] : [{ title: `Write \`@ ${example}\``, text: `${text.trimEnd()} @ ${example}` }];
  return problem(
    'at-missing',
    `The frequency is missing at which this holds: ${quoted(`${written} @ ${example}`)}.`,
    quantityStart,
    text.trimEnd().length,
    fixes,
  );
}

function readFrequency(
  cursor: Cursor,
  spec: QuantitySpec,
  context: QuantityContext,
  start: number,
): Outcome<number | 'nyquist'> {
  const { text } = cursor;
  const number = scanNumber(cursor);
  const token = scanUnit(cursor);
  if (!number) {
    if (token.text.toLowerCase() === 'nyquist')
      return readNyquist(token.text, spec, context, text, start, token.start, token.end);
    const end = Math.max(token.end, start + 1);
    return problem(
      'at',
      token.text === ''
        ? 'Behind `@` stands a frequency, as `@ 12.9 GHz`.'
        : `${quoted(token.text)} is not a frequency; write for example \`@ 12.9 GHz\`.`,
      start,
      end,
    );
  }
  if (token.text === '') {
    const units = fittingUnits(number.text, { dimensions: ['frequency'], plausible: [1e6, 2e11] });
    const written = text.slice(number.start, number.end);
    const fixes = units.map((unit) => withUnit(text, number, unit));
    return problem(
      'bare-number',
      `The frequency behind \`@\` needs a unit, as \`@ ${written.slice(0, 20)} ${units[0]?.text ?? 'GHz'}\`.`,
      number.start,
      number.end,
      fixes,
    );
  }
  const unit = unitNamed(token.text);
  if (!unit) return unknownUnit(text, token, ['frequency']);
  if (unit.dimension !== 'frequency') {
    return problem(
      'dimension',
      `Behind \`@\` stands a frequency; ${quoted(text.slice(number.start, token.end))} is ${wanted(unit.dimension)}.`,
      number.start,
      token.end,
    );
  }
  const value = inSi(number.text, unit);
  if (value >= FREQUENCIES[0] && value <= FREQUENCIES[1]) return { ok: value };
  return problem(
    'out-of-range',
    `${quoted(text.slice(number.start, token.end))} is no possible frequency here: 1 Hz to 10000 GHz is.`,
    number.start,
    token.end,
  );
}

function readNyquist(
  word: string,
  spec: QuantitySpec,
  { nyquistHz }: QuantityContext,
  text: string,
  atSign: number,
  start: number,
  end: number,
): Outcome<'nyquist'> {
  if (spec.at === 'never' || spec.at === undefined) return { ok: 'nyquist' };
  if (spec.at !== 'nyquist') {
    const frequency = nyquistHz === undefined ? undefined : exactly(nyquistHz, 'frequency');
    const fixes =
      frequency === undefined
        ? []
        : [{ title: `Write \`@ ${frequency}\``, text: replaced(text, start, end, frequency) }];
    return problem(
      'nyquist-not-allowed',
      `\`@ nyquist\` is for limits, budgets and owners; an element’s own data holds at a frequency${frequency ? `, here \`@ ${frequency}\`` : ', as `@ 12.9 GHz`'}.`,
      atSign,
      end,
      fixes,
    );
  }
  if (word === 'nyquist') return { ok: 'nyquist' };
  return problem('at', `${quoted(word)} is written \`nyquist\`.`, start, end, [
    { title: 'Write `nyquist`', text: replaced(text, start, end, 'nyquist'), safe: true },
  ]);
}
