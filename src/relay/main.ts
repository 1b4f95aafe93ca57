// The command line of the house: finds the command and turns what happens into words on stderr and an exit code.

import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { DuskveerError } from '../air/index.ts';
import { EXIT, UsageError, type Command } from './command.ts';
import { OutputClosed, OutputFailed } from './output.ts';
import { problemInWords } from './reporter.ts';

// Both src/relay and dist/relay lie two folders below the checkout.
const root = fileURLToPath(new URL('../..', import.meta.url));

/** Each is loaded when it is called, so that none waits for the libraries of another. */
const COMMANDS: Readonly<Record<string, { summary: string; load: () => Promise<Command> }>> = {
  read: {
    summary: 'prints the profiles that files hold',
    load: async () => (await import('./read.ts')).command,
  },
  jets: {
    summary: 'finds low-level jets in each profile',
    load: async () => (await import('./jets.ts')).command,
  },
  tracks: {
    summary: 'follows jets through the night: story, kind, evidence',
    load: async () => (await import('./tracks.ts')).command,
  },
  rotor: {
    summary: 'computes speed, shear and veer over rotor discs',
    load: async () => (await import('./rotor.ts')).command,
  },
  ramps: {
    summary: 'finds fast changes of output and their causes',
    load: async () => (await import('./ramps.ts')).command,
  },
  moisture: {
    summary: 'computes humidity flux, transport and precipitable water',
    load: async () => (await import('./moisture.ts')).command,
  },
  triangle: {
    summary: 'computes divergence, vorticity and moisture convergence between stations',
    load: async () => (await import('./triangle.ts')).command,
  },
  storm: {
    summary: 'computes parcels, shear, helicity and storm motion',
    load: async () => (await import('./storm.ts')).command,
  },
  scan: {
    summary: 'makes tables of jets and nights out of years of files',
    load: async () => (await import('./scan/scan.ts')).command,
  },
  serve: {
    summary: 'shows the page in a browser, with the demo loaded',
    load: async () =>
      (await import('./serve.ts')).serveCommand({ board: join(root, 'dist/board'), demo: join(root, 'demo-profiles') }),
  },
};

const LIST = Object.entries(COMMANDS)
  .map(([name, { summary }]) => `  ${name.padEnd(10)} ${summary}`)
  .join('\n');

const HELP = `duskveer COMMAND [OPTIONS] [PATH ...]

${LIST}

duskveer COMMAND --help says what a command reads and prints.
Exit: 0 all well, 1 could not run, 2 wrong usage, 3 some input could not be read (the rest is printed).
`;

async function run(args: readonly string[]): Promise<number> {
  const [name, ...rest] = args;
  if (name === undefined || name === '--help' || name === '-h' || name === 'help') {
    process.stdout.write(HELP);
    return name === undefined ? EXIT.wrongUsage : EXIT.well;
  }
  const entry = Object.hasOwn(COMMANDS, name) ? COMMANDS[name] : undefined;
  if (entry === undefined) {
    process.stderr.write(`There is no command ${name}.\n\n${HELP}`);
    return EXIT.wrongUsage;
  }
  const command = await entry.load();
  if (rest.includes('--help') || rest.includes('-h')) {
    process.stdout.write(`${command.help}\n`);
    return EXIT.well;
  }
  try {
    return await command.run(rest);
  } catch (error) {
    return explained(name, error);
  }
}

/** Trouble with the call, the site file or the output in words; anything else is a fault of ours and is thrown on. */
function explained(name: string, error: unknown): number {
  if (error instanceof UsageError) {
    process.stderr.write(`${error.message}\nHow to call it: duskveer ${name} --help\n`);
    return EXIT.wrongUsage;
  }
  // Whoever read the output has seen enough.
  if (error instanceof OutputClosed) return EXIT.well;
  if (error instanceof OutputFailed) {
    process.stderr.write(`The output could not be written: ${error.message}.\n`);
    return EXIT.failed;
  }
  if (!(error instanceof DuskveerError)) throw error;
  process.stderr.write(`${problemInWords(error.problem)}\n`);
  return EXIT.wrongUsage;
}

process.exitCode = await run(process.argv.slice(2));
