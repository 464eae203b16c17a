import { CHECK_OUTPUT_VERSION, type CheckedFile } from '../../../schemas/outputs/check';
import { checkedFile } from './checked-file';
import { countFindings } from './counts';
import type { MakePrinter } from './types';

/** One document, written as it goes; the bytes depend on the inputs alone. */
export const json: MakePrinter = ({ write, version }) => {
  const counts = countFindings();
  let first = true;
  const open = () =>
    write(
      `{\n"version": ${CHECK_OUTPUT_VERSION},\n"tool": ${JSON.stringify({ name: 'lanewright', version })},\n"files": [`,
    );
  return {
    file(analysis) {
      if (first) open();
      const checked: CheckedFile = checkedFile(analysis);
      counts.add(analysis);
      write(`${first ? '' : ','}\n${JSON.stringify(checked, null, 1)}`);
      first = false;
    },
    end() {
      if (first) open();
      write(`\n],\n"counts": ${JSON.stringify(counts.total())}\n}\n`);
    },
  };
};
