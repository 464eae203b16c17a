import { styleText } from 'node:util';
import type { Analysis } from '../../../src-core/analysis';
import { fileKind } from '../../../src-core/inputs';
import { show } from '../../../src-core/quantity/show';
import type { Finding } from '../../../src-core/report';
import { countFindings } from './counts';
import { plain } from './plain';
import { locate } from './positions';
import type { MakePrinter, PrinterContext } from './types';

type Style = Parameters<typeof styleText>[0];
const styleOf: Record<Finding['severity'], Style> = { error: 'red', warning: 'yellow', info: 'cyan', hint: 'gray' };
const sign: Record<Finding['severity'], string> = { error: 'error', warning: 'warning', info: 'info', hint: 'hint' };

/** For people: a verdict a channel, its findings below, a count at the end. The same text with and without colour. */
export const text: MakePrinter = (context) => {
  const paint = (style: Style, words: string) =>
    context.colour ? styleText(style, words, { validateStream: false }) : words;
  const counts = countFindings();
  return {
    file(analysis) {
      counts.add(analysis);
      const shownFindings = analysis.findings.filter(
        ({ severity, waivedBy }) => !waivedBy && (!context.quiet || severity === 'error'),
      );
      const isChannel = fileKind(analysis.inputs.file) === 'channel';
      if (context.quiet && shownFindings.length === 0) return;
      if (!isChannel && shownFindings.length === 0) return;
      context.write(
        `${paint('bold', plain(context.shown(analysis.inputs.file)))}${isChannel ? `  ${verdictLine(analysis, paint)}` : ''}\n`,
      );
      for (const finding of shownFindings) context.write(findingLines(finding, analysis, context, paint));
    },
    end() {
      const { files, errors, warnings, infos, hints, waived } = counts.total();
      const parts = [show.count(errors, 'error'), show.count(warnings, 'warning')];
      if (infos + hints > 0) parts.push(show.count(infos + hints, 'note'));
      if (waived > 0) parts.push(`${show.count(waived, 'finding')} accepted`);
      if (!context.quiet || errors > 0) context.write(`\n${show.count(files, 'file')}: ${parts.join(', ')}\n`);
    },
  };
};

type Paint = (style: Style, words: string) => string;

function verdictLine({ verdict }: Analysis, paint: Paint): string {
  const style: Record<typeof verdict.state, Style> = {
    good: 'green',
    warnings: 'yellow',
    errors: 'red',
    'not-computed': 'gray',
  };
  return paint(style[verdict.state], plain(verdict.text));
}

function findingLines(finding: Finding, analysis: Analysis, { shown }: PrinterContext, paint: Paint): string {
  const { file, range } = locate(finding, analysis);
  const where = `${file === analysis.inputs.file ? '' : `${plain(shown(file))}:`}${range.start.line}:${range.start.column}`;
  const lines = [
    `  ${where}  ${paint(styleOf[finding.severity], sign[finding.severity])}  ${finding.rule}  ${plain(finding.message)}`,
  ];
  for (const fix of finding.fixes ?? [])
    lines.push(`      ${paint('dim', 'fix:')} ${plain((fix.resolve?.() ?? fix).title)}`);
  return `${lines.join('\n')}\n`;
}
