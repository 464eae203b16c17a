import { parseArgs } from 'node:util';
import { nearest } from '../../src-core/quantity/nearest';
import { type Command, commonOptions, type Option, type OptionValues, Refusal } from './command';

export const optionsOf = (command: Command): readonly Option[] => [...command.options, ...commonOptions];

/** `--format` may be `json=FILE`: the choice is what stands before the first `=`. */
const choiceOf = (value: string) => value.split('=', 1)[0];

/** Reads a command's arguments by its table of options. @throws Refusal that names the option and what is wrong */
export function readArguments(command: Command, args: readonly string[]): { paths: string[]; options: OptionValues } {
  const table = optionsOf(command);
  const { values, positionals, tokens } = parseArgs({
    args: [...args],
    strict: false,
    allowPositionals: true,
    tokens: true,
    options: Object.fromEntries(
      table.map((option) => [
        option.name,
        {
          type: option.value ? ('string' as const) : ('boolean' as const),
          ...(option.short && { short: option.short }),
          ...(option.multiple && { multiple: true }),
        },
      ]),
    ),
  });
  for (const token of tokens) {
    if (token.kind !== 'option') continue;
    const option = table.find(({ name }) => name === token.name);
    if (!option) {
      const near = nearest(
        token.name,
        table.map(({ name }) => name),
      );
      throw new Refusal(
        `\`${token.rawName}\` is not an option of \`lanewright ${command.name}\`${near ? `; did you mean \`--${near}\`?` : '.'} See \`lanewright ${command.name} --help\`.`,
      );
    }
    if (option.value && token.value === undefined)
      throw new Refusal(`\`--${option.name}\` wants a value: \`--${option.name} ${option.value}\`.`);
    if (!option.value && token.value !== undefined) throw new Refusal(`\`--${option.name}\` takes no value.`);
    if (option.choices && token.value !== undefined && !option.choices.includes(choiceOf(token.value))) {
      throw new Refusal(`\`${token.value}\` is not a choice of \`--${option.name}\`: ${option.choices.join(', ')}.`);
    }
  }
  return { paths: positionals, options: values as OptionValues };
}
