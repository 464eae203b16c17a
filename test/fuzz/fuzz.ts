import { uniformInt } from 'pure-rand/distribution/uniformInt';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import { hintsOf } from '../../src-core/assist/hints';
import { rangeOf } from '../../src-core/text/range';
import { entryAt, faultsOf, timed, visible } from './checks';
import { examples } from './inputs';
import {
  everyKeyMisspelt,
  everyLineDeleted,
  everyLineIndentedWrongly,
  everyPrefix,
  everyUnitDropped,
  type Mutation,
  randomEdit,
} from './mutations';

export interface FuzzOptions {
  readonly root: string;
  readonly seed: number;
  /** 1: everything; 10: a tenth of each kind. */
  readonly every: number;
  readonly randomEdits: number;
  readonly sequences: number;
  readonly say: (line: string) => void;
}

export interface FuzzResult {
  readonly texts: number;
  readonly faults: readonly string[];
  /** Of the faults put inside one element: how often the first finding stood in its lines, and how often all others kept their hints. */
  readonly local: { readonly cases: number; readonly firstFindingInside: number; readonly othersKept: number };
  readonly slowestMilliseconds: number;
}

/** Breaks every example in every way and looks whether the analysis stays sound. */
export async function fuzz({ root, seed, every, randomEdits, sequences, say }: FuzzOptions): Promise<FuzzResult> {
  const source = examples(root);
  const random = xoroshiro128plus(seed);
  const faults: string[] = [];
  const local = { cases: 0, firstFindingInside: 0, othersKept: 0 };
  let texts = 0;
  let slowest = 0;
  const note = (what: string, file: string, found: readonly string[]) =>
    faults.push(...found.map((fault) => `${file}, ${what}: ${fault}`));

  for (const file of source.channels) {
    const good = source.textOf(file);
    const base = timed(await source.inputs(file, good)).analysis;
    const kinds: [string, Iterable<Mutation>, boolean][] = [
      ['prefixes', everyPrefix(good, 1), false],
      ['keys misspelt', everyKeyMisspelt(good), true],
      ['units dropped', everyUnitDropped(good), true],
      ['lines deleted', everyLineDeleted(good), false],
      ['lines indented wrongly', everyLineIndentedWrongly(good), false],
    ];
    for (const [name, mutations, isLocal] of kinds) {
      let count = 0;
      let skip = uniformInt(random, 0, every - 1);
      for (const mutation of mutations) {
        if (skip-- > 0) continue;
        skip = every - 1;
        count++;
        texts++;
        try {
          // Kept stages of the good text stand for what an editor has at hand.
          const { analysis, milliseconds } = timed(await source.inputs(file, mutation.text), base);
          slowest = Math.max(slowest, milliseconds);
          note(mutation.what, file, faultsOf(analysis, milliseconds));
          if (isLocal) judgeLocality(mutation, base, analysis, local);
        } catch (error) {
          note(mutation.what, file, [`threw ${error instanceof Error ? error.stack : String(error)}`]);
        }
      }
      say(`${file}: ${count} ${name}`);
    }
  }

  for (let i = 0; i < Math.ceil(randomEdits / every); i++) {
    const file = source.channels[i % source.channels.length];
    let text = source.textOf(file);
    for (let edits = uniformInt(random, 1, 8); edits > 0; edits--) text = randomEdit(text, random);
    texts++;
    try {
      const { analysis, milliseconds } = timed(await source.inputs(file, text));
      slowest = Math.max(slowest, milliseconds);
      note(`random text ${i} of seed ${seed}`, file, faultsOf(analysis, milliseconds));
    } catch (error) {
      note(`random text ${i} of seed ${seed}`, file, [
        `threw ${error instanceof Error ? error.stack : String(error)}\n${text}`,
      ]);
    }
  }
  say(`${Math.ceil(randomEdits / every)} random texts`);

  const wanted = Math.ceil(sequences / every);
  for (let i = 0; i < wanted; i++) {
    const file = source.channels[i % source.channels.length];
    let text = source.textOf(file);
    let kept = timed(await source.inputs(file, text)).analysis;
    for (let step = 0; step < 12; step++) {
      text = step % 4 === 3 ? source.textOf(file) : randomEdit(text, random);
      kept = timed(await source.inputs(file, text), kept).analysis;
      texts++;
    }
    const cold = timed(await source.inputs(file, text)).analysis;
    if (visible(kept) !== visible(cold))
      faults.push(`${file}, edit sequence ${i} of seed ${seed}: ends in another state than a cold analysis`);
  }
  say(`${wanted} edit sequences`);
  return { texts, faults, local, slowestMilliseconds: slowest };
}

type AnalysisLike = ReturnType<typeof timed>['analysis'];

/** A fault inside one element: is it told there, and do the others keep what is shown beside them? */
function judgeLocality(
  mutation: Mutation,
  base: AnalysisLike,
  broken: AnalysisLike,
  local: { cases: number; firstFindingInside: number; othersKept: number },
): void {
  const entry = mutation.at === undefined ? undefined : entryAt(base, mutation.at);
  if (!entry) return;
  const known = new Set(base.findings.map(({ message }) => message));
  const fresh = broken.findings.find(({ message }) => !known.has(message));
  if (!fresh) return; // the text still says the same, or something else that is valid
  local.cases++;
  const parsed = broken.parsed.get(broken.inputs.file);
  if (parsed && fresh.at.file === broken.inputs.file) {
    const { start } = fresh.range ?? rangeOf(parsed, fresh.at);
    const grown = parsed.text.length - (base.parsed.get(base.inputs.file)?.text.length ?? 0);
    if (start >= entry.start && start <= entry.end + Math.max(0, grown)) local.firstFindingInside++;
  }
  const lines = (analysis: AnalysisLike, wanted: (offset: number) => boolean) =>
    new Set(
      hintsOf(analysis, analysis.inputs.file)
        .filter(({ offset }) => wanted(offset))
        .map(({ offset }) => lineHead(analysis, offset)),
    );
  const before = lines(base, (offset) => offset < entry.start || offset > entry.end);
  const after = lines(broken, () => true);
  const lost = [...before].filter((line) => !after.has(line));
  if (lost.length === 0) local.othersKept++;
}

/** The text of the line at an offset: names a hint's element whatever moved. */
function lineHead(analysis: AnalysisLike, offset: number): string {
  const text = analysis.parsed.get(analysis.inputs.file)?.text ?? '';
  const start = text.lastIndexOf('\n', offset - 1) + 1;
  const end = text.indexOf('\n', start);
  return text.slice(start, end < 0 ? undefined : end).trim();
}
