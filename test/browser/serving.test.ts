import { once } from 'node:events';
import { spawn } from 'node:child_process';
import { describe, expect, inject, it } from 'vitest';
import { duskveer } from '../relay/command-line.ts';

describe('serve', () => {
  it('names an unknown option and says which are known', async () => {
    const { code, out, err } = await duskveer(['serve', '--prot', '1']);
    expect(code).toBe(2);
    expect(out).toBe('');
    expect(err).toContain('There is no option --prot. Known here: --port, --host.');
    expect(err).toContain('duskveer serve --help');
  });

  it.each(['eighty', '70000', '1.5'])('refuses the port "%s"', async (port) => {
    const { code, err } = await duskveer(['serve', `--port=${port}`]);
    expect(code).toBe(2);
    expect(err).toContain('--port needs a');
  });

  it('says in words that its port is in use, and what to do', async () => {
    const { port } = new URL(inject('pageAddress'));
    const { code, out, err } = await duskveer(['serve', '--port', port]);
    expect(code).toBe(1);
    expect(out).toBe('');
    expect(err).toContain(`Port ${port} on 127.0.0.1 is in use already`);
    expect(err).toContain(`--port ${Number(port) + 1}`);
  });

  it('ends well when interrupted, even while a browser holds a connection', async () => {
    const server = spawn(process.execPath, ['src/relay/duskveer.mjs', 'serve', '--port', '0']);
    const [line] = (await once(server.stdout, 'data')) as [Buffer];
    const address = /http:\S+/.exec(line.toString())?.[0] ?? '';
    expect((await fetch(address)).status).toBe(200);
    server.kill('SIGINT');
    expect(await once(server, 'exit')).toEqual([0, null]);
  });
});
