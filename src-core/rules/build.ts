import { quoted } from '../model/reports';
import { rules } from './list';
import type { AnyRule } from './types';

const anchor = ({ name }: AnyRule) => `[${quoted(name)}](#${name})`;

const optionsText = ({ options }: AnyRule) =>
  Object.entries(options)
    .map(([name, value]) => `\`${name}: ${String(value)}\``)
    .join(', ');

const example = (heading: string, text: string) => (text ? [`${heading}:`, '', '```yaml', text, '```', ''] : []);

function paragraph(rule: AnyRule): readonly string[] {
  const options = optionsText(rule);
  return [
    `## ${rule.name}`,
    '',
    `Default: ${rule.severity}${options ? `; ${options}` : ''}.`,
    '',
    rule.doc.replace(/\s*\n\s*/g, ' '),
    '',
    ...example('Has this finding', rule.bad),
    ...example('Has none', rule.good),
  ];
}

const HEAD = `# Rules

<!-- Written by \`npm run references\` from the list in \`src-core/rules/list.ts\`; do not edit. -->

Each finding stands under the name of a rule. Severities and options are set in \`lanewright.config.yaml\`, the nearest one upwards:

\`\`\`yaml
lanewright: 1
rules:
  stub-resonance: { severity: error, multiple: 4 }       # error | warning | info | hint | off
  unused-part: off
\`\`\`

A finding is accepted only by an entry in the channel's \`waivers\`, with reason, date and, where it has one, value; beyond them it
returns. The examples are laid over one complete channel (\`src-core/rules/testing-base.ts\`), entries of the same name in place of its own.
`;

/** The reference of all rules as Markdown: `src-core/rules/README.md`, which rule links open. */
export function rulesReference(): string {
  const table = [
    '| rule | default | options |',
    '| --- | --- | --- |',
    ...rules.map((rule) => `| ${anchor(rule)} | ${rule.severity} | ${optionsText(rule)} |`),
  ];
  return `${[HEAD, ...table, '', ...rules.flatMap(paragraph)].join('\n').trimEnd()}\n`;
}
