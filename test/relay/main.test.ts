import { describe, expect, it } from 'vitest';
import { duskveer } from './command-line.ts';

describe('the command line', () => {
  it('lists its commands', async () => {
    const { code, out } = await duskveer(['--help']);
    expect(code).toBe(0);
    expect(out).toMatch(/^ {2}serve /m);
  });

  it('called with nothing, shows the list and fails', async () => {
    expect(await duskveer([])).toMatchObject({ code: 2, err: '' });
  });

  it('names an unknown command and shows the list on stderr', async () => {
    const { code, out, err } = await duskveer(['melt']);
    expect(code).toBe(2);
    expect(out).toBe('');
    expect(err).toContain('There is no command melt.');
  });

  it('names an unknown option and says which are known', async () => {
    const { code, out, err } = await duskveer(['serve', '--prot', '1']);
    expect(code).toBe(2);
    expect(out).toBe('');
    expect(err).toContain('There is no option --prot. Known here: --port, --host.');
    expect(err).toContain('duskveer serve --help');
  });
});

describe('serve', () => {
  it.each(['eighty', '70000', '1.5'])('refuses the port "%s"', async (port) => {
    const { code, err } = await duskveer(['serve', `--port=${port}`]);
    expect(code).toBe(2);
    expect(err).toContain('--port needs a');
  });
});
