#!/usr/bin/env node
import { type Command, Refusal, type Terminal } from './command';

declare const LANEWRIGHT_VERSION: string;

/** Loaded when asked for, so that `--version` does not wait for physics and plots. */
const commands: Record<string, { summary: string; arguments: string; load(): Promise<Command> }> = {
  check: {
    arguments: '[FILES|FOLDERS]',
    summary: 'Findings and a one-line verdict for each channel.',
    load: () => import('./check').then(({ check }) => check),
  },
  curves: {
    arguments: 'FILE',
    summary: 'The numbers behind the plots.',
    load: () => import('./curves').then(({ curves }) => curves),
  },
  report: {
    arguments: 'FILE',
    summary: 'A page with pictures.',
    load: () => import('./report').then(({ report }) => report),
  },
  review: {
    arguments: '[BASE] [HEAD]',
    summary: 'What a change did to each channel.',
    load: () => import('./review').then(({ review }) => review),
  },
};

/** NO_COLOR and FORCE_COLOR count when present and not empty; NO_COLOR wins; `--color` stands above both. */
function wantsColour(args: readonly string[]): boolean {
  const at = args.findIndex((arg) => arg === '--color' || arg.startsWith('--color='));
  const when = at < 0 ? 'auto' : args[at].includes('=') ? args[at].slice('--color='.length) : args[at + 1];
  if (when === 'always' || when === 'never') return when === 'always';
  const { NO_COLOR, FORCE_COLOR, TERM } = process.env;
  if (NO_COLOR) return false;
  if (FORCE_COLOR) return FORCE_COLOR !== '0';
  return process.stdout.isTTY === true && TERM !== 'dumb';
}

function terminalOf(args: readonly string[]): Terminal {
  return {
    out: (text) => void process.stdout.write(text),
    note: (text) => void process.stderr.write(text),
    colour: wantsColour(args),
    watched: process.stderr.isTTY === true && !process.env.CI,
    readStdin: async () => {
      const chunks: Buffer[] = [];
      for await (const chunk of process.stdin) chunks.push(chunk as Buffer);
      return Buffer.concat(chunks).toString('utf8');
    },
  };
}

async function main(args: readonly string[]): Promise<number> {
  const [name, ...rest] = args;
  if (name === '--version' || name === '-V') {
    process.stdout.write(`${LANEWRIGHT_VERSION}\n`);
    return 0;
  }
  if (name === undefined || name === '--help' || name === '-h' || name === 'help') {
    const help = await import('./help');
    const wanted = name === 'help' && rest[0] !== undefined ? commands[rest[0]] : undefined;
    process.stdout.write(
      wanted
        ? help.commandHelp(await wanted.load())
        : help.overview(
            Object.entries(commands).map(([key, value]) => ({ name: key, ...value })),
            LANEWRIGHT_VERSION,
          ),
    );
    return name === undefined ? 2 : 0;
  }
  const entry = Object.hasOwn(commands, name) ? commands[name] : undefined;
  if (!entry)
    throw new Refusal(
      `\`${name}\` is not a command of lanewright: ${Object.keys(commands).join(', ')}. See \`lanewright --help\`.`,
    );
  const command = await entry.load();
  if (rest.includes('--help') || rest.includes('-h')) {
    process.stdout.write((await import('./help')).commandHelp(command));
    return 0;
  }
  const { readArguments } = await import('./arguments');
  const terminal = terminalOf(rest);
  return command.run({ ...readArguments(command, rest), terminal });
}

// A reader that closes early (`| head`) ends the work quietly.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code === 'EPIPE') process.exit(0);
  throw error;
});
process.once('SIGINT', () => process.exit(130));

main(process.argv.slice(2)).then(
  (status) => {
    process.exitCode = status;
  },
  (error: unknown) => {
    process.stderr.write(
      `lanewright: ${error instanceof Refusal ? error.message : error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`,
    );
    process.exitCode = 2;
  },
);
