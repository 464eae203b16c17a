import { Lexer } from 'yaml';
import type { ComposeError } from './compose';
import { MAX_NESTING } from './limits';
import type { TextReport } from './reports';
import { lineEnd } from './syntax';
import type { FilePath, TextRange, ValuePath } from './types';

interface Bracket {
  readonly offset: number;
  readonly opens: '{' | '[';
}

interface Openers {
  /** Brackets that nothing closes, outermost first. */
  readonly unclosed: readonly Bracket[];
  readonly stray?: { readonly offset: number; readonly closes: string };
  readonly quote?: { readonly offset: number; readonly mark: string };
}

/** What opens and does not close in a piece of text. */
function openersOf(piece: string, shift: number): Openers {
  const stack: Bracket[] = [];
  const lost: Bracket[] = [];
  let stray: Openers['stray'];
  let quote: Openers['quote'];
  let offset = 0;
  let scalarFollows = false;
  for (const token of new Lexer().lex(piece)) {
    if (!scalarFollows && (token === '\u0002' || token === '\u0018' || token === '\u001f')) {
      scalarFollows = token === '\u001f';
      continue;
    }
    const mark = token[0];
    if (scalarFollows) scalarFollows = false;
    else if (token === '{' || token === '[') stack.push({ offset: offset + shift, opens: token });
    else if (token === '}' || token === ']') {
      const wanted = token === '}' ? '{' : '[';
      let at = stack.length - 1;
      while (at >= 0 && stack[at].opens !== wanted) at--;
      if (at < 0) stray ??= { offset: offset + shift, closes: token };
      else lost.push(...stack.splice(at).slice(1));
    } else if ((mark === '"' || mark === "'") && (token.length === 1 || !token.endsWith(mark))) {
      quote ??= { offset: offset + shift, mark };
    }
    offset += token.length;
  }
  return { unclosed: lost.length > 0 ? lost : stack, stray, quote };
}

export interface PieceContext {
  readonly file: FilePath;
  /** The text that the offsets are of. */
  readonly text: string;
  readonly path: ValuePath;
}

export function tooDeepReport({ file, path }: PieceContext, offset: number): TextReport {
  return {
    rule: 'limit',
    at: { file, path },
    range: { start: offset, end: offset + 1 },
    message: `Brackets and indentation nest deeper than ${MAX_NESTING} levels here; this part is not read. Nothing in the format needs more than six.`,
  };
}

/** One report for a piece that does not parse: the first cause, where it begins. */
export function explain(
  context: PieceContext,
  piece: string,
  shift: number,
  errors: readonly ComposeError[],
): TextReport {
  const { file, text, path } = context;
  const report = (
    range: TextRange,
    message: string,
    fix?: { title: string; range: TextRange; text: string },
  ): TextReport => ({
    rule: 'yaml',
    at: { file, path },
    range,
    message,
    ...(fix && { fixes: [{ title: fix.title, edits: [{ op: 'range', file, range: fix.range, text: fix.text }] }] }),
  });
  const { unclosed, stray, quote } = openersOf(piece, shift);
  const pieceEnd = shift + piece.trimEnd().length;
  if (quote) {
    const end = Math.min(lineEnd(text, quote.offset), Math.max(pieceEnd, quote.offset + 1));
    return report({ start: quote.offset, end }, `The quote \`${quote.mark}\` opens here and is not closed.`, {
      title: `Close the quote at the end of the line`,
      range: { start: end, end },
      text: quote.mark,
    });
  }
  if (unclosed.length > 0) {
    const [first] = unclosed;
    const closers = [...unclosed].reverse().map(({ opens }) => (opens === '{' ? '}' : ']'));
    const end = closePosition(text, piece, shift, first);
    return report(
      { start: first.offset, end: first.offset + 1 },
      `\`${first.opens}\` opens here and is not closed by \`${first.opens === '{' ? '}' : ']'}\`.`,
      {
        title: `Close it: add \`${closers.join(' ')}\``,
        range: { start: end, end },
        text: `${closers[0] === '}' ? ' ' : ''}${closers.join(' ')}`,
      },
    );
  }
  if (stray) {
    const range = { start: stray.offset, end: stray.offset + 1 };
    return report(range, `\`${stray.closes}\` closes nothing: no bracket is open here.`, {
      title: `Remove \`${stray.closes}\``,
      range,
      text: '',
    });
  }
  const [error] = errors;
  const start = Math.max(shift, Math.min(error.start, pieceEnd));
  const end = Math.max(start, Math.min(error.end, lineEnd(text, start)));
  return report({ start, end }, messageOf(error));
}

/** Where a bracket that is lost inside others should close: before what closes its parent, else at the piece's end. */
function closePosition(text: string, piece: string, shift: number, bracket: Bracket): number {
  const end = lineEnd(text, bracket.offset);
  const wanted = bracket.opens === '{' ? ']' : '}';
  const parent = text.indexOf(wanted, bracket.offset);
  const pieceEnd = shift + piece.trimEnd().length;
  let at = parent !== -1 && parent < Math.min(end, pieceEnd) ? parent : pieceEnd;
  while (at > bracket.offset + 1 && /\s/.test(text[at - 1])) at--;
  return at;
}

function messageOf({ code, message }: ComposeError): string {
  switch (code) {
    case 'BLOCK_AS_IMPLICIT_KEY':
    case 'MULTILINE_IMPLICIT_KEY':
      return 'A second `: ` stands in this value. Put the value in quotes, or begin a new line for the second key.';
    case 'BAD_SCALAR_START':
      return 'A value cannot begin with this character. Put the value in quotes.';
    case 'BAD_DQ_ESCAPE':
      return 'This escape is not one that double quotes know. Use single quotes, or write `\\\\` for a backslash.';
    case 'BAD_ALIAS':
      return 'An alias is written `*name`, without a space or a colon in the name.';
    case 'MULTIPLE_DOCS':
      return 'One file holds one document: what follows this `---` is not read.';
    case 'BLOCK_IN_FLOW':
      return 'A list or mapping by indentation cannot stand inside brackets.';
    case 'MULTIPLE_ANCHORS':
    case 'MULTIPLE_TAGS':
      return 'A value takes one anchor and one tag at most.';
    case 'KEY_OVER_1024_CHARS':
      return 'A key is longer than 1,024 characters.';
    case 'UNEXPECTED_TOKEN':
      return 'This does not belong here: a value has ended before it. A comma, a quote or a line break may be missing.';
    case 'MISSING_CHAR':
      return 'Something is missing here: a comma between values, or a colon and a space after a key.';
    case 'BAD_INDENT':
      return 'This line is not indented as what it belongs to.';
    default:
      return `This is not valid YAML: ${message.charAt(0).toLowerCase()}${message.slice(1)}.`;
  }
}
