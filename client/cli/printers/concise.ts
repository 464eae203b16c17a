import { plain } from './plain';
import { locate } from './positions';
import type { MakePrinter } from './types';

/** A line a finding, for editors and scripts: `FILE:LINE:COLUMN: SEVERITY RULE: MESSAGE`. */
export const concise: MakePrinter = ({ write, shown, quiet }) => ({
  file(analysis) {
    for (const finding of analysis.findings) {
      if (finding.waivedBy || (quiet && finding.severity !== 'error')) continue;
      const { file, range } = locate(finding, analysis);
      write(
        `${plain(shown(file))}:${range.start.line}:${range.start.column}: ${finding.severity} ${finding.rule}: ${plain(finding.message)}\n`,
      );
    }
  },
  end() {},
});
