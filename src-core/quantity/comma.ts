import { problem, type QuantityFix, type QuantityProblem, quoted } from './problem';
import { isDigit } from './scan';

/** The first comma between two digits, where decimals are written with a comma; -1 if there is none. */
export function decimalComma(text: string, from = 0): number {
  for (let at = text.indexOf(',', from); at >= 0; at = text.indexOf(',', at + 1)) {
    if (isDigit(text[at - 1]) && isDigit(text[at + 1])) return at;
  }
  return -1;
}

/** `3,37 mm`: one fix; `1,000 mm`: two, since thousands may be meant. */
export function commaProblem(text: string, at: number): { problem: QuantityProblem } {
  let start = at;
  while (start > 0 && isPartOfNumber(text[start - 1])) start--;
  let end = at + 1;
  while (end < text.length && isPartOfNumber(text[end])) end++;
  const piece = text.slice(start, end);
  const asDecimal = piece.replace(',', '.');
  const mayBeThousands = end - at === 4 && !piece.includes('.');
  const fixes: QuantityFix[] = [
    { title: `Write ${quoted(asDecimal)}`, text: withoutCommas(text, '.'), ...(!mayBeThousands && { safe: true }) },
  ];
  if (mayBeThousands) fixes.push({ title: `Write ${quoted(piece.replace(',', ''))}`, text: withoutCommas(text, '') });
  const thousands = mayBeThousands ? '; thousands are written without a separator' : '';
  return problem(
    'comma-decimal',
    `Decimals are written with a point: ${quoted(piece)} is ${quoted(asDecimal)}${thousands}.`,
    start,
    end,
    fixes,
  );
}

const isPartOfNumber = (letter: string) => isDigit(letter) || letter === '.';

function withoutCommas(text: string, by: string): string {
  const pieces: string[] = [];
  let from = 0;
  for (let at = decimalComma(text); at >= 0; at = decimalComma(text, from)) {
    pieces.push(text.slice(from, at));
    from = at + 1;
  }
  return [...pieces, text.slice(from)].join(by);
}
