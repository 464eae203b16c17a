import type { Analysis } from '../../src-core/analysis';
import type { Finding, Fix } from '../../src-core/report';
import { addWaivers } from '../../src-core/rules/add-waivers';
import { applyEdits, resolveEdits } from '../../src-core/text/edits';
import type { FilePath, TextEdit } from '../../src-core/text/types';
import { type OptionValues, Refusal, type Terminal } from './command';
import type { Workspace } from './files';
import { writeAtomically } from './write';

/** Each pass takes fixes that do not touch each other; a fix may bring up the next. */
const MOST_PASSES = 10;

interface Context {
  readonly workspace: Workspace;
  readonly options: OptionValues;
  readonly terminal: Terminal;
  readonly analyseAgain: () => Promise<Analysis>;
}

/** Applies what `--fix`, `--diff` and `--add-waivers` ask for; the analysis of what then stands on disk. */
export async function fixFile(analysis: Analysis, context: Context): Promise<Analysis> {
  const { options } = context;
  let current = analysis;
  if (options.diff) {
    const edits = fixEdits(current, options);
    if (edits.length) context.terminal.note(diffOf(current, edits, context.workspace));
  } else if (options.fix) {
    for (let pass = 0; pass < MOST_PASSES; pass++) {
      const edits = fixEdits(current, options);
      if (edits.length === 0) break;
      await write(current, edits, context.workspace);
      current = await context.analyseAgain();
    }
  }
  if (options['add-waivers']) {
    const { 'add-waivers': by, until, reason } = options;
    if (typeof by !== 'string' || typeof until !== 'string' || typeof reason !== 'string')
      throw new Refusal(
        '`--add-waivers BY` needs `--until YYYY-MM-DD` and `--reason TEXT`: a waiver without them is none.',
      );
    const edits = resolveEdits(addWaivers(current, { by, until, reason }), current.parsed);
    if (edits.length) {
      await write(current, edits, context.workspace);
      current = await context.analyseAgain();
    }
  }
  return current;
}

const wantedFix = ({ fixes = [], waivedBy }: Finding, unsafe: boolean): Fix | undefined => {
  if (waivedBy) return undefined;
  const safe = fixes.filter((fix) => fix.safe);
  if (safe.length) return safe.find((fix) => fix.preferred) ?? (safe.length === 1 ? safe[0] : undefined);
  return unsafe ? fixes.find((fix) => fix.preferred) : undefined;
};

/** The edits of as many wanted fixes as do not overlap, in this file alone. */
function fixEdits(analysis: Analysis, options: OptionValues): TextEdit[] {
  const taken: TextEdit[] = [];
  for (const finding of analysis.findings) {
    const fix = wantedFix(finding, options['unsafe-fixes'] === true);
    if (!fix) continue;
    const edits = resolveEdits(fix.edits, analysis.parsed);
    const free = edits.every(
      (edit) =>
        edit.file === analysis.inputs.file &&
        !taken.some((other) => edit.range.start <= other.range.end && other.range.start <= edit.range.end),
    );
    if (free) taken.push(...edits);
  }
  return taken.sort((a, b) => a.range.start - b.range.start);
}

function textsAfter(
  { parsed }: Analysis,
  edits: readonly TextEdit[],
): Map<FilePath, { before: string; after: string }> {
  const changed = new Map<FilePath, { before: string; after: string }>();
  for (const file of new Set(edits.map((edit) => edit.file))) {
    const before = parsed.get(file)?.text;
    if (before === undefined) continue;
    changed.set(file, {
      before,
      after: applyEdits(
        before,
        edits.filter((edit) => edit.file === file),
      ),
    });
  }
  return changed;
}

async function write(analysis: Analysis, edits: readonly TextEdit[], workspace: Workspace): Promise<void> {
  for (const [file, { after }] of textsAfter(analysis, edits)) await writeAtomically(workspace.toDisk(file), after);
}

/** Lines of a hunk as a unified diff counts them: from 1, and none as standing behind the line before. */
const span = (top: number, lines: readonly string[]) => `${lines.length > 0 ? top + 1 : top},${lines.length}`;

/** What changes in each file, as one hunk from the first line that changes to the last. */
function diffOf(analysis: Analysis, edits: readonly TextEdit[], workspace: Workspace): string {
  let output = '';
  for (const [file, { before, after }] of textsAfter(analysis, edits)) {
    output += `--- ${workspace.shown(file)}\n+++ ${workspace.shown(file)}\n`;
    const old = before.split('\n');
    const fresh = after.split('\n');
    let top = 0;
    while (top < old.length && top < fresh.length && old[top] === fresh[top]) top++;
    let bottom = 0;
    while (
      bottom < old.length - top &&
      bottom < fresh.length - top &&
      old[old.length - 1 - bottom] === fresh[fresh.length - 1 - bottom]
    )
      bottom++;
    const gone = old.slice(top, old.length - bottom);
    const come = fresh.slice(top, fresh.length - bottom);
    output += `@@ -${span(top, gone)} +${span(top, come)} @@\n${gone.map((line) => `-${line}\n`).join('')}${come.map((line) => `+${line}\n`).join('')}`;
  }
  return output;
}
