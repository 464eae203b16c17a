import { analyse } from '../../../src-core/analyse';
import type { Analysis } from '../../../src-core/analysis';
import { analyseFiles, TODAY } from '../../../src-core/rules/testing';
import { BOARD, CHANNEL, files } from '../../../src-core/rules/testing-base';
import type { FileContent, FilePath } from '../../../src-core/text/types';
import type { MakePrinter, PrinterContext } from './types';

/** What someone might put into a title, a name or a reason to be read as markup, a command, a link, an argument or colour. */
export const HOSTILE =
  '</failure>]]><b x="1">\'&amp; %0A%25 \r\n::error title=x::owned\n##[error]owned [a](https://evil.example) {0} \u001b[31m\u202e\u2066\u061c\u0007\u009b\ud800';

/** The same in a file's name, as far as a file can be called so. */
export const HOSTILE_FILE = 'lanes ]]>/::error file=a,line=1::%0A"<b>\'\u202e\u001b[31m#?&.channel.yaml';

const yamlText = (text: string) =>
  `"${text.replace(/[^ !#-[\]-~]/g, (character) => `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`)}"`;

const base = (files.get(CHANNEL) as { text: string }).text;

/** A channel with a stub and an eye that fails, both named by someone hostile; `waived`: the stub is accepted for a hostile reason. */
export function hostileChannel({ waived = false } = {}): string {
  const name = yamlText(HOSTILE);
  const waiver = `waivers:\n  - { rule: stub-resonance, at: ${name}, reason: ${name}, by: ${name}, until: 2099-01-01 }\n`;
  return `${base
    .replace('title: Rule example', `title: ${name}`)
    .replace('{ via: dive, part: board.hole }', `{ via: ${name}, part: board.long-hole }`)
    .replace('eye: main, height: 40 mV', `eye: ${name}, height: 4 V`)
    .replaceAll('board.parts.yaml', '../board.parts.yaml')
    .replaceAll('other.parts.yaml', '../other.parts.yaml')}${waived ? waiver : ''}`;
}

/** The analysis of a text under a name, beside the boards of the rules' examples. */
export function analysed(text: string, file: FilePath = HOSTILE_FILE): Analysis {
  const all = new Map<FilePath, FileContent>([...files, [file, { kind: 'text', text }]]);
  return analyse({ file, files: all, today: TODAY }, undefined, { until: 'link' });
}

/** A channel in the root, beside its boards. */
export const plainChannel = (change: (text: string) => string = (text) => text): Analysis =>
  analyseFiles(new Map<FilePath, FileContent>([...files, [CHANNEL, { kind: 'text', text: change(base) }]]));

export { BOARD, CHANNEL };

export function printed(
  make: MakePrinter,
  analyses: readonly Analysis[],
  context: Partial<PrinterContext> = {},
): string {
  let out = '';
  const printer = make({
    write: (text) => {
      out += text;
    },
    colour: false,
    shown: (file) => file,
    version: '0.1.0',
    quiet: false,
    ...context,
  });
  for (const analysis of analyses) printer.file(analysis);
  printer.end();
  return out;
}
