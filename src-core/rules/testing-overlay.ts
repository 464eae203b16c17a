import { isMap, isPair, isScalar, isSeq, type Node, type Pair, parseDocument } from 'yaml';

/** A text laid over another, and where each of its own characters went. */
export interface Laid {
  readonly text: string;
  /** Offset in the overlay → offset in `text`. */
  readonly moved: (offset: number) => number;
}

interface Entry {
  readonly name: string;
  readonly start: number;
  readonly end: number;
}

const end = (node: Node) => node.range![1];
const keyText = (pair: Pair) => String(isScalar(pair.key) ? pair.key.value : pair.key);

function pairsOf(source: string): Map<string, Pair<Node, Node | null>> {
  const { contents } = parseDocument(source, { uniqueKeys: false });
  return new Map(isMap(contents) ? contents.items.map((pair) => [keyText(pair), pair as Pair<Node, Node | null>]) : []);
}

/** Entries of a list by the name that their first key gives. */
function entriesOf(pair: Pair<Node, Node | null> | undefined): Entry[] {
  if (!pair || !isSeq(pair.value)) return [];
  return pair.value.items.map((item) => {
    const first = isMap(item) ? item.items[0] : undefined;
    const name = isPair(first) && isScalar(first.value) ? `${keyText(first)} ${String(first.value.value)}` : '';
    return { name: name.replace(/^.* /, ''), start: (item as Node).range![0], end: end(item as Node) };
  });
}

/** Base entries, those that the overlay renames kept in their place; new ones behind the one that stands before them there. */
function merged(base: readonly Entry[], over: readonly Entry[]) {
  const result = base.map((entry) => {
    const replaced = over.find(({ name }) => name === entry.name);
    return replaced ? { from: 'overlay' as const, ...replaced } : { from: 'base' as const, ...entry };
  });
  over.forEach((entry, i) => {
    if (base.some(({ name }) => name === entry.name)) return;
    const before = i > 0 ? result.findIndex(({ name }) => name === over[i - 1].name) : -1;
    result.splice(before < 0 ? result.length : before + 1, 0, { from: 'overlay', ...entry });
  });
  return result;
}

/**
 * Lays YAML over a base: a key of the overlay stands in place of the base's, an entry of a list in place of the entry of the same
 * name; other keys and entries are added; `key: null` takes one away.
 */
export function lay(base: string, overlay: string): Laid {
  const moves: { from: number; to: number; length: number }[] = [];
  let text = '';
  const emit = (source: string, start: number, stop: number, isOverlay: boolean) => {
    if (isOverlay) moves.push({ from: start, to: text.length, length: stop - start });
    text += source.slice(start, stop).trimEnd();
  };
  const [below, over] = [pairsOf(base), pairsOf(overlay)];
  for (const key of new Set([...below.keys(), ...over.keys()])) {
    const [under, upper] = [below.get(key), over.get(key)];
    if (upper && isScalar(upper.value) && upper.value.value === null) continue;
    const [lower, higher] = [entriesOf(under), entriesOf(upper)];
    if (under && upper && lower.length > 0 && higher.length > 0) {
      text += `${key}:\n`;
      for (const entry of merged(lower, higher)) {
        text += '  - ';
        emit(entry.from === 'base' ? base : overlay, entry.start, entry.end, entry.from === 'overlay');
        text += '\n';
      }
    } else {
      const pair = (upper ?? under)!;
      emit(upper ? overlay : base, pair.key.range![0], pair.value ? end(pair.value) : end(pair.key), Boolean(upper));
      text += '\n';
    }
  }
  const moved = (offset: number) => {
    const move = moves.find(({ from, length }) => offset >= from && offset <= from + length);
    if (!move) throw new Error(`Nothing of the overlay at ${offset} is in the text.`);
    return move.to + offset - move.from;
  };
  return { text, moved };
}
