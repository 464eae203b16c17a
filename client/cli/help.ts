import { optionsOf } from './arguments';
import type { Command, Option } from './command';

const WIDTH = 96;

function wrap(text: string, indent: number, width = WIDTH): string {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    if (line && indent + line.length + 1 + word.length > width) {
      lines.push(line);
      line = word;
    } else line = line ? `${line} ${word}` : word;
  }
  lines.push(line);
  return lines.join(`\n${' '.repeat(indent)}`);
}

const heading = ({ short, name, value }: Option) => `${short ? `-${short}, ` : ''}--${name}${value ? ` ${value}` : ''}`;

function rows(pairs: readonly (readonly [string, string])[]): string {
  const column = Math.min(30, Math.max(...pairs.map(([left]) => left.length)) + 4);
  return pairs
    .map(
      ([left, right]) =>
        `  ${left.padEnd(column - 2)}${left.length > column - 3 ? `\n${' '.repeat(column)}` : ''}${wrap(right, column)}`,
    )
    .join('\n');
}

const choices = (option: Option) => (option.choices ? ` One of: ${option.choices.join(', ')}.` : '');

export function commandHelp(command: Command): string {
  return [
    `lanewright ${command.name} ${command.arguments}`.trimEnd(),
    '',
    wrap(command.summary, 0),
    '',
    'Options',
    rows(optionsOf(command).map((option) => [heading(option), option.help + choices(option)])),
    '',
    'Examples',
    rows(command.examples),
    '',
    command.options.some(({ name }) => name === 'fail-on')
      ? 'Exit status: 0, no finding that --fail-on names; 1, some; 2, it could not be carried out.'
      : 'Exit status: 0, done; 2, it could not be carried out.',
    '',
  ].join('\n');
}

export function overview(
  commands: readonly { name: string; summary: string; arguments: string }[],
  version: string,
): string {
  return [
    `lanewright ${version}: high-speed serial channels kept as text, validated and computed.`,
    '',
    'Commands',
    rows(commands.map(({ name, arguments: args, summary }) => [`${name} ${args}`, summary])),
    '',
    rows([
      ['--version', 'Show the version.'],
      ['COMMAND --help', 'Show what a command takes.'],
    ]),
    '',
    wrap(
      'Figures are planning estimates. They do not replace a full-wave model, a measurement, or the compliance test of the standard that governs the port.',
      0,
    ),
    '',
  ].join('\n');
}
