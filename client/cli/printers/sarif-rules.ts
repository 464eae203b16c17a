import { rules } from '../../../src-core/rules/list';
import type { AnyRule } from '../../../src-core/rules/types';

export type SarifLevel = 'error' | 'warning' | 'note';
export const levelOf = { error: 'error', warning: 'warning', info: 'note', hint: 'note' } as const;

const oneLine = (text: string) => text.replace(/\s*\n\s*/g, ' ');
/** Up to the first full stop that ends a sentence. */
const firstSentence = (text: string) => /^.*?[.:;](?=\s|$)/.exec(text)?.[0].replace(/[:;]$/, '.') ?? text;

const example = (heading: string, text: string) => (text ? `\n\n${heading}:\n\n\`\`\`yaml\n${text}\n\`\`\`` : '');

/** A forge shows at most this much of a description. */
const MOST_CHARACTERS = 1000;
const shortened = (text: string) => (text.length > MOST_CHARACTERS ? `${text.slice(0, MOST_CHARACTERS - 1)}…` : text);

const descriptor = ({ name, severity, reads, doc, bad, good, options }: AnyRule) => {
  const text = oneLine(doc);
  const settings = Object.entries(options).map(([option, value]) => `\`${option}: ${String(value)}\``);
  const set = settings.length > 0 ? `\n\nOptions in \`lanewright.config.yaml\`: ${settings.join(', ')}.` : '';
  return {
    id: name,
    shortDescription: { text: shortened(firstSentence(text)) },
    fullDescription: { text: shortened(text) },
    help: { text, markdown: `${text}${set}${example('Has this finding', bad)}${example('Has none', good)}` },
    defaultConfiguration: { level: levelOf[severity] },
    properties: { tags: ['signal-integrity', reads] },
  };
};

/** Every rule as a reporting descriptor, in the order of the reference. */
export const ruleDescriptors = rules.map(descriptor);

const indices = new Map(rules.map(({ name }, index) => [name, index]));
/** Position of a rule in `ruleDescriptors`. */
export const ruleIndex = (name: string) => indices.get(name);
