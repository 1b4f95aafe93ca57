// What every command of the command line looks like, and how its options are read.

import { parseArgs, type ParseArgsConfig } from 'node:util';

/** How a run ended, for the shell. */
export const EXIT = {
  well: 0,
  /** The work could not be done for a reason outside the input. */
  failed: 1,
  wrongUsage: 2,
  /** Some input could not be read; the rest was printed. */
  someUnread: 3,
} as const;

export interface Command {
  /** What it reads, what it prints, its options. */
  readonly help: string;
  /** @returns the exit code; throws UsageError when called wrongly */
  run(args: readonly string[]): Promise<number>;
}

/** The command was called wrongly; the message says how to call it rightly. */
export class UsageError extends Error {}

type Options = NonNullable<ParseArgsConfig['options']>;

/**
 * Options and paths of a command.
 * @throws UsageError for an unknown option, one without its value or one that takes none
 */
export function parseOptions<T extends Options>(
  args: readonly string[],
  options: T,
): ReturnType<typeof parseArgs<{ args: string[]; options: T; allowPositionals: true }>> {
  try {
    return parseArgs({ args: joinNegatives(args, options), options, allowPositionals: true });
  } catch (error) {
    throw new UsageError(usageProblem(error as Error & { code?: string }, Object.keys(options)), { cause: error });
  }
}

/** `--motion -3,5` is meant as `--motion=-3,5`: a number may begin with a minus, an option never with a digit behind it. */
function joinNegatives(args: readonly string[], options: Options): string[] {
  const joined: string[] = [];
  for (const arg of args) {
    const before = joined.at(-1) ?? '';
    const takesValue = before.startsWith('--') && options[before.slice(2)]?.type === 'string';
    if (takesValue && /^-[\d.]/.test(arg)) joined[joined.length - 1] = `${before}=${arg}`;
    else joined.push(arg);
  }
  return joined;
}

function usageProblem(error: Error & { code?: string }, known: readonly string[]): string {
  const given = /'(-[^']*)'/.exec(error.message)?.[1] ?? '';
  if (error.code === 'ERR_PARSE_ARGS_UNKNOWN_OPTION') {
    const list = known.map((name) => `--${name}`).join(', ');
    return `There is no option ${given}. ${list === '' ? 'This command takes none.' : `Known here: ${list}.`}`;
  }
  return error.message.replace(/\n[\s\S]*/, '');
}

/**
 * A number given on the command line.
 * @throws UsageError when it is none or lies outside the bounds
 */
export function numberOption(name: string, text: string, least: number, most: number): number {
  const value = Number(text);
  if (text.trim() === '' || !(value >= least && value <= most)) {
    throw new UsageError(`--${name} needs a number from ${least} to ${most}, not "${text}".`);
  }
  return value;
}
