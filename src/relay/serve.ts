// `serve`: the page and the demo over HTTP, for browsers on this machine or on the site's network.

import { serve as listen } from '@hono/node-server';
import { existsSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import { createApp, type AppFolders } from './app.ts';
import { EXIT, numberOption, parseOptions, UsageError, type Command } from './command.ts';

const DEFAULT_PORT = 8620;
const DEFAULT_HOST = '127.0.0.1';

/** The command, serving these folders. */
export function serveCommand(folders: AppFolders): Command {
  return {
    help: `duskveer serve [--port NUMBER] [--host ADDRESS]

Serves the page and the demo's files until stopped with Ctrl-C, and prints the address to open.

  --port NUMBER    ${DEFAULT_PORT} unless said otherwise; 0 takes any free one
  --host ADDRESS   ${DEFAULT_HOST} unless said otherwise: only this machine can open the page.
                   0.0.0.0 opens it to every machine that can reach this one; there is no password.`,
    async run(args) {
      const { values, positionals } = parseOptions(args, {
        port: { type: 'string', default: String(DEFAULT_PORT) },
        host: { type: 'string', default: DEFAULT_HOST },
      });
      if (positionals.length > 0) throw new UsageError(`serve takes no paths, but was given ${positionals.join(' ')}.`);
      const port = numberOption('port', values.port, 0, 65_535);
      if (!Number.isInteger(port)) throw new UsageError(`--port needs a whole number, not "${values.port}".`);
      if (!existsSync(join(folders.board, 'index.html'))) {
        process.stderr.write('The page has not been built. Run: npm run build\n');
        return EXIT.failed;
      }
      return listenUntilStopped(folders, port, values.host);
    },
  };
}

function listenUntilStopped(folders: AppFolders, port: number, host: string): Promise<number> {
  return new Promise((resolve) => {
    const server = listen({ fetch: createApp(folders).fetch, port, hostname: host }, (address) =>
      process.stdout.write(`Duskveer is at ${addressInWords(address)}   (Ctrl-C ends it)\n`),
    );
    server.on('error', (error: NodeJS.ErrnoException) => {
      process.stderr.write(`${listenProblem(error, port, host)}\n`);
      resolve(EXIT.failed);
    });
    const stop = (): void => {
      server.close(() => resolve(EXIT.well));
      // Browsers keep connections open; without this the close would wait for them.
      if ('closeAllConnections' in server) server.closeAllConnections();
    };
    process.once('SIGINT', stop);
    process.once('SIGTERM', stop);
  });
}

function addressInWords({ address, family, port }: AddressInfo): string {
  return `http://${family === 'IPv6' ? `[${address}]` : address}:${port}/`;
}

function listenProblem(error: NodeJS.ErrnoException, port: number, host: string): string {
  switch (error.code) {
    case 'EADDRINUSE':
      return `Port ${port} on ${host} is in use already, perhaps by another Duskveer. End that one, or take another port: npm start -- --port ${port + 1}`;
    case 'EACCES':
      return `This user may not open port ${port}. Take one above 1023: npm start -- --port ${DEFAULT_PORT}`;
    case 'EADDRNOTAVAIL':
    case 'ENOTFOUND':
      return `This machine has no address ${host}. Leave --host away, or give one of its own addresses.`;
    default:
      return `The page cannot be served on ${host}, port ${port}: ${error.message}`;
  }
}
