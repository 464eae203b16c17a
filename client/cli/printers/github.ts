import { show } from '../../../src-core/quantity/show';
import { visible } from './escape';
import { type ToldFinding, toldFile, wanted, worstFirst } from './told';
import type { MakePrinter } from './types';

type Level = 'error' | 'warning' | 'notice';
const levelOf: Readonly<Record<ToldFinding['severity'], Level>> = {
  error: 'error',
  warning: 'warning',
  info: 'notice',
  hint: 'notice',
};

/** The forge drops what a step says beyond this, of each level, without a word. */
const MOST_OF_A_LEVEL = 10;

const data = (text: string) => text.replace(/%/g, '%25').replace(/\r/g, '%0D').replace(/\n/g, '%0A');
const property = (text: string) => data(text).replace(/:/g, '%3A').replace(/,/g, '%2C');

/** One finding as a workflow command: a note at its line in the forge's view of the change. */
export function annotation({ severity, rule, message, location: { file, range }, fixes }: ToldFinding): string {
  const { start, end } = range;
  const columns = start.line === end.line ? { col: start.column, endColumn: end.column } : {};
  const properties = { file: visible(file), line: start.line, endLine: end.line, ...columns, title: rule };
  const written = Object.entries(properties).map(([name, value]) => `${name}=${property(String(value))}`);
  const words = [visible(message), ...fixes.map(({ title }) => `fix: ${visible(title)}`)].join('\n');
  return `::${levelOf[severity]} ${written.join(',')}::${data(words)}`;
}

/** The worst findings within what the forge shows of one step, then how many are left. */
export function annotations(findings: readonly ToldFinding[]): string[] {
  const used: Record<Level, number> = { error: 0, warning: 0, notice: 0 };
  const shown = worstFirst(findings).filter(({ severity }) => used[levelOf[severity]]++ < MOST_OF_A_LEVEL);
  const left = findings.length - shown.length;
  return [
    ...shown.map(annotation),
    ...(left > 0 ? [`… and ${show.count(left, 'more finding')}: \`lanewright check\` tells all of them.`] : []),
  ];
}

/** Annotations of a forge's build, worst first. */
export const github: MakePrinter = ({ write, quiet }) => {
  const findings: ToldFinding[] = [];
  return {
    file(analysis) {
      findings.push(...wanted(toldFile(analysis).findings, quiet).filter(({ waived }) => !waived));
    },
    end() {
      for (const line of annotations(findings)) write(`${line}\n`);
    },
  };
};
