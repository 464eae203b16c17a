/** One option of a command: the table from which parsing, `--help` and completion are made. */
export interface Option {
  readonly name: string;
  readonly short?: string;
  /** What stands for the value in the help; absent: a switch. */
  readonly value?: string;
  readonly choices?: readonly string[];
  readonly multiple?: boolean;
  readonly help: string;
}

export type OptionValues = Readonly<Record<string, string | boolean | readonly string[] | undefined>>;

export interface Terminal {
  /** The report. */
  out(text: string): void;
  /** All else. */
  note(text: string): void;
  readonly colour: boolean;
  /** A person watches stderr: progress may be shown. */
  readonly watched: boolean;
  readStdin(): Promise<string>;
}

export interface Command {
  readonly name: string;
  readonly summary: string;
  readonly arguments: string;
  readonly options: readonly Option[];
  readonly examples: readonly (readonly [command: string, what: string])[];
  /** @returns 0: nothing that `--fail-on` names; 1: some. What is thrown could not be carried out: status 2. */
  run(call: {
    readonly paths: readonly string[];
    readonly options: OptionValues;
    readonly terminal: Terminal;
  }): Promise<number>;
}

/** What a person did wrong or what the machine refused: printed as it is, without a stack. */
export class Refusal extends Error {}

export const commonOptions: readonly Option[] = [
  {
    name: 'root',
    value: 'FOLDER',
    help: 'Folder that no path may leave. Default: the git work tree, else the current folder.',
  },
  { name: 'config', value: 'FILE', help: 'Use this file in place of the nearest lanewright.config.yaml.' },
  { name: 'no-config', help: 'Use no config file.' },
  { name: 'date', value: 'YYYY-MM-DD', help: 'The day on which waivers are judged. Default: today, UTC.' },
  {
    name: 'color',
    value: 'WHEN',
    choices: ['auto', 'always', 'never'],
    help: 'Colours. Default: auto, which obeys NO_COLOR and FORCE_COLOR.',
  },
  { name: 'help', short: 'h', help: 'Show this help.' },
];
