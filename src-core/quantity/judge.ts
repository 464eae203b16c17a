import type { Dimension, Quantity, QuantitySpec } from '../../schemas/format/types';
import { problem, type QuantityFix, type QuantityProblem, quoted, replaced } from './problem';
import { type Cursor, scanNumber, scanUnit } from './scan';
import { show } from './show';
import { fittingUnits, isWithin } from './unit-problems';
import { inSi } from './units';

/**
 * Holds the value and the ends of its tolerance against what is possible, then the value against what is plausible.
 * @param start where the quantity begins in its text @param unitEnd where its unit ends
 * @returns no quantity where it is impossible; quantity and problem where it is implausible
 */
export function judged(
  quantity: Quantity,
  spec: QuantitySpec,
  start: number,
  unitEnd: number,
): { quantity?: Quantity; problem?: QuantityProblem } {
  if (quantity.dimension !== spec.dimensions[0]) return { quantity };
  const { value, plus, minus, text, dimension } = quantity;
  const { valid, plausible } = spec;
  if (valid && !isWithin(value, valid)) {
    return problem(
      'out-of-range',
      `${quoted(text)} is not possible here: it ${bound(value, valid, dimension)}.`,
      start,
      unitEnd,
    );
  }
  const worst = valid && [value - minus, value + plus].find((end) => !isWithin(end, valid));
  if (valid && worst !== undefined) {
    const reaches = show.dimension(worst, dimension);
    return problem(
      'out-of-range',
      `With its tolerance ${quoted(text)} reaches ${reaches}; it ${bound(worst, valid, dimension)}.`,
      start,
      start + text.length,
    );
  }
  if (isWithin(value, plausible)) return { quantity };
  return { quantity, ...implausible(quantity, plausible!, start, unitEnd) };
}

function bound(value: number, [low, high]: readonly [number, number], dimension: Dimension): string {
  if (value > high) return `is at most ${show.dimension(high, dimension)}`;
  if (low === 0) return 'cannot be negative';
  return value <= 0 && low > 0 ? 'is above zero' : `is at least ${show.dimension(low, dimension)}`;
}

function implausible(quantity: Quantity, plausible: readonly [number, number], start: number, unitEnd: number) {
  const { text, value, dimension, unit } = quantity;
  const size = value < plausible[0] ? 'small' : 'large';
  const usual = show.rangeOf(plausible[0], plausible[1], dimension);
  const question = unit === '' ? '' : ' Is the unit right?';
  const message = `${quoted(text)} is implausibly ${size}: ${usual} is usual here.${question}`;
  return problem('implausible', message, start, unitEnd, unit === '' ? [] : otherUnits(quantity, plausible));
}

/** The same number with each unit that would make it plausible. */
function otherUnits({ text, unit, dimension }: Quantity, plausible: readonly [number, number]): QuantityFix[] {
  const cursor: Cursor = { text, at: 0 };
  const number = scanNumber(cursor)!;
  const token = scanUnit(cursor);
  return fittingUnits(number.text, { dimensions: [dimension], plausible })
    .filter((other) => other.text !== unit && isWithin(inSi(number.text, other), plausible))
    .map((other) => ({
      title: `Write ${quoted(`${text.slice(number.start, number.end)} ${other.text}`)}`,
      text: replaced(text, token.start, token.end, other.text),
    }));
}
