import { expect } from 'vitest';
import { analyse } from '../analyse';
import type { Analysis } from '../analysis';
import type { Finding, Fix } from '../report';
import { applyEdits, resolveEdits } from '../text/edits';
import { rangeOf } from '../text/index';
import type { FileContent, FilePath } from '../text/types';
import { BOARD, CHANNEL, CONFIG, files } from './testing-base';
import { lay } from './testing-overlay';

/** The day on which every example is judged. */
export const TODAY = '2026-06-30';

/** A first line that says where what follows goes: another file, or as it stands at the end of the channel. */
const SECTION = /^# (board\.parts\.yaml|lanewright\.config\.yaml|written at the end)\n/;

/** The files of an example: what it says laid over the base. */
export function filesWith(example: string): {
  files: ReadonlyMap<FilePath, FileContent>;
  moved: (offset: number) => number;
} {
  const section = SECTION.exec(example)?.[1];
  const body = section ? example.replace(SECTION, '') : example;
  const file = section === BOARD || section === CONFIG ? section : CHANNEL;
  const base = (files.get(file) as { text: string }).text;
  const laid =
    section === 'written at the end'
      ? { text: `${base}${body}\n`, moved: (at: number) => at + base.length }
      : lay(base, body);
  return { files: new Map([...files, [file, { kind: 'text', text: laid.text }]]), moved: laid.moved };
}

export function analyseFiles(
  all: ReadonlyMap<FilePath, FileContent>,
  { file = CHANNEL, until = 'link', previous }: { file?: FilePath; until?: 'time' | 'link'; previous?: Analysis } = {},
): Analysis {
  return analyse({ file, files: all, configFile: CONFIG, today: TODAY }, previous, { until });
}

const analysed = new Map<string, Analysis>();

/** The analysis of an example, of its configuration where it is about that. Computed once. */
export function analyseExample(example: string): Analysis {
  const known = analysed.get(example);
  if (known) return known;
  const file = example.startsWith(`# ${CONFIG}`) ? CONFIG : CHANNEL;
  const analysis = analyseFiles(filesWith(example).files, { file });
  analysed.set(example, analysis);
  return analysis;
}

interface Marked {
  readonly start: number;
  readonly end: number;
  readonly severity: string;
  readonly rule: string;
  readonly words: string;
}

/** `#   ^^^^^^ warning stub-resonance: notch at 27.6 GHz` under the line that it is about. */
const MARK = /^\s*#(\s*)(\^+) (error|warning|info|hint) ([a-z-]+): (.*)$/;

/** Takes the common indentation and the marks out of a text. */
function readMarks(marked: string): { text: string; marks: Marked[] } {
  const lines = marked.replace(/^\n/, '').trimEnd().split('\n');
  const indent = Math.min(...lines.filter((line) => line.trim()).map((line) => /^ */.exec(line)![0].length));
  const marks: Marked[] = [];
  let text = '';
  let lineStart = 0;
  for (const line of lines.map((one) => one.slice(indent))) {
    const mark = MARK.exec(line);
    if (mark) {
      const start = lineStart + line.indexOf('^');
      marks.push({ start, end: start + mark[2].length, severity: mark[3], rule: mark[4], words: mark[5] });
    } else {
      lineStart = text.length;
      text += `${line}\n`;
    }
  }
  return { text, marks };
}

const rangeIn = ({ parsed }: Analysis, finding: Finding) =>
  finding.range ?? rangeOf(parsed.get(finding.at.file)!, finding.at);

const asText = (finding: Finding, text: string) =>
  `${finding.severity} ${finding.rule} at \`${text}\`: ${finding.message}`;

/**
 * The findings of an example are the marked ones and no other: at that range, of that severity and rule, with those words.
 * @param until `time` where nothing of the eye is wanted: an eighth of the work
 */
export function expectFindings(marked: string, until: 'time' | 'link' = 'time'): void {
  const { text, marks } = readMarks(marked);
  const { files: all, moved } = filesWith(text);
  const analysis = analyseFiles(all, { until });
  const whole = (all.get(CHANNEL) as { text: string }).text;
  const found = analysis.findings.map((finding) => {
    const { start, end } = rangeIn(analysis, finding);
    return asText(finding, whole.slice(start, end));
  });
  expect(found).toHaveLength(marks.length);
  for (const { start, end, severity, rule, words } of marks) {
    const at = whole.slice(moved(start), moved(end));
    const finding = analysis.findings.find((one) => one.rule === rule && rangeIn(analysis, one).start === moved(start));
    expect(found.join('\n')).toContain(`${severity} ${rule} at \`${at}\`: `);
    expect(finding?.message).toContain(words);
  }
}

/** The files after a fix. */
export function applyFix(fix: Fix, analysis: Analysis): ReadonlyMap<FilePath, FileContent> {
  const all = new Map(analysis.inputs.files);
  const edits = resolveEdits(fix.edits, analysis.parsed);
  for (const file of new Set(edits.map((edit) => edit.file))) {
    const text = applyEdits(
      analysis.parsed.get(file)!.text,
      edits.filter((edit) => edit.file === file),
    );
    all.set(file, { kind: 'text', text });
  }
  return all;
}

const wrapped = (entry: string) => (entry.startsWith('{') ? `path: [${entry}]` : entry);

/** The preferred (or only) fix at the cursor `‸` writes `after`. Both are overlays; a bare `{ … }` is an entry of `path`. */
export function expectFix(before: string, after: string, title?: string): void {
  const source = wrapped(before);
  const cursor = source.indexOf('‸');
  const { files: all, moved } = filesWith(source.replace('‸', ''));
  const analysis = analyseFiles(all);
  const at = moved(cursor);
  const fixes = analysis.findings
    .filter((finding) => rangeIn(analysis, finding).start <= at && at <= rangeIn(analysis, finding).end)
    .flatMap((finding) => finding.fixes ?? []);
  const fix = fixes.find(({ preferred }) => preferred) ?? fixes[0];
  expect(fix, `no fix at the cursor: ${analysis.findings.map(({ message }) => message).join('; ')}`).toBeDefined();
  if (title) expect((fix.resolve?.() ?? fix).title).toContain(title);
  expect(applyFix(fix, analysis).get(CHANNEL)).toEqual(filesWith(wrapped(after)).files.get(CHANNEL));
}
