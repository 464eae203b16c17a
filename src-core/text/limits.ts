import { Lexer } from 'yaml';

export const MAX_TEXT_BYTES = 1024 * 1024;
export const MAX_NESTING = 64;
export const MAX_ALIAS_NODES = 1000;
export const MAX_REPORTS = 200;

/**
 * Where a text nests deeper than `limit`, block and flow counted together; undefined where it does not.
 * The library's own lexer is iterative, its composer is not: deep nesting can end the whole process (yaml 2.9.1, Node 20),
 * so this runs before every parse.
 */
export function tooDeepAt(text: string, limit = MAX_NESTING): number | undefined {
  if (!mayNest(text, limit)) return undefined;
  // Block levels that are open: twice the column, plus one for a list, which may stand at its key's own column.
  const levels: number[] = [];
  let flow = 0;
  let offset = 0;
  let lineBegin = 0;
  let contentColumn = 0;
  let scalarFollows = false;
  const open = (level: number) => {
    while (levels.length > 0 && levels[levels.length - 1] > level) levels.pop();
    if (levels[levels.length - 1] !== level) levels.push(level);
  };
  for (const token of new Lexer().lex(text)) {
    if (!scalarFollows && (token === '\u0002' || token === '\u0018' || token === '\u001f')) {
      if (token === '\u0018') flow = 0;
      scalarFollows = token === '\u001f';
      continue;
    }
    const column = offset - lineBegin;
    if (scalarFollows) {
      scalarFollows = false;
      if (flow === 0) contentColumn = column;
    } else if (token === '{' || token === '[') {
      if (flow === 0) contentColumn = column;
      flow++;
    } else if (token === '}' || token === ']') flow = Math.max(0, flow - 1);
    else if (flow === 0) {
      if (token === '-') open(2 * column + 1);
      else if (token === '?') open(2 * column);
      else if (token === ':') open(2 * contentColumn);
      else if (token[0] === '"' || token[0] === "'" || token[0] === '*') contentColumn = column;
    }
    if (levels.length + flow > limit) return offset;
    offset += token.length;
    const newline = token.lastIndexOf('\n');
    if (newline !== -1) lineBegin = offset - token.length + newline + 1;
  }
  return undefined;
}

/** Each level is begun by a character of its own: a text with few of them, as one entry is, cannot nest deeply. */
function mayNest(text: string, limit: number): boolean {
  let left = limit;
  for (let i = 0; i < text.length; i++) {
    const character = text[i];
    const begins =
      character === ':' || character === '-' || character === '{' || character === '[' || character === '?';
    if (begins && --left < 0) return true;
  }
  return false;
}

/** Length in UTF-8 without building it. */
export function utf8Length(text: string): number {
  let bytes = text.length;
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i);
    if (code <= 0x7f) continue;
    bytes += code > 0x7ff ? 2 : 1;
    const next = text.charCodeAt(i + 1);
    // A pair of surrogates is four bytes in all, two of which are counted already.
    if (code >= 0xd800 && code <= 0xdbff && next >= 0xdc00 && next <= 0xdfff) i++;
  }
  return bytes;
}
