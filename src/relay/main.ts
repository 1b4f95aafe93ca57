// The command line of the house: finds the command and turns what happens into words on stderr and an exit code.

import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { EXIT, UsageError, type Command } from './command.ts';
import { serveCommand } from './serve.ts';

// Both src/relay and dist/relay lie two folders below the checkout.
const root = fileURLToPath(new URL('../..', import.meta.url));

const COMMANDS: readonly Command[] = [
  serveCommand({ board: join(root, 'dist/board'), demo: join(root, 'demo-profiles') }),
];

const HELP = `duskveer COMMAND [OPTIONS] [PATH ...]

${COMMANDS.map((command) => `  ${command.name.padEnd(10)} ${command.summary}`).join('\n')}

duskveer COMMAND --help says what a command reads and prints.
Exit: 0 all well, 1 could not run, 2 wrong usage, 3 some input could not be read (the rest is printed).
`;

async function run(args: readonly string[]): Promise<number> {
  const [name, ...rest] = args;
  if (name === undefined || name === '--help' || name === '-h' || name === 'help') {
    process.stdout.write(HELP);
    return name === undefined ? EXIT.wrongUsage : EXIT.well;
  }
  const command = COMMANDS.find((candidate) => candidate.name === name);
  if (command === undefined) {
    process.stderr.write(`There is no command ${name}.\n\n${HELP}`);
    return EXIT.wrongUsage;
  }
  if (rest.includes('--help') || rest.includes('-h')) {
    process.stdout.write(`${command.help}\n`);
    return EXIT.well;
  }
  try {
    return await command.run(rest);
  } catch (error) {
    if (!(error instanceof UsageError)) throw error;
    process.stderr.write(`${error.message}\nHow to call it: duskveer ${name} --help\n`);
    return EXIT.wrongUsage;
  }
}

process.exitCode = await run(process.argv.slice(2));
