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
});
