import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { createApp } from '../../src/relay/app.ts';

const folder = mkdtempSync(join(tmpdir(), 'duskveer-app-'));
mkdirSync(join(folder, 'board/assets'), { recursive: true });
mkdirSync(join(folder, 'demo'));
writeFileSync(join(folder, 'board/index.html'), '<!doctype html><title>page</title>');
writeFileSync(join(folder, 'board/assets/part-1a2b.js'), `export const words = '${'long '.repeat(1000)}';`);
writeFileSync(join(folder, 'demo/night.nc'), Uint8Array.of(67, 68, 70, 1));
writeFileSync(join(folder, 'demo/site.json'), '{}');
writeFileSync(join(folder, 'demo/generate.ts'), '');
writeFileSync(join(folder, 'secret.txt'), 'not for the page');
afterAll(() => rmSync(folder, { recursive: true }));

const app = createApp({ board: join(folder, 'board'), demo: join(folder, 'demo') });

describe('createApp', () => {
  it('serves the page with headers that let only its own scripts run', async () => {
    const response = await app.request('/');
    expect(response.status).toBe(200);
    expect(response.headers.get('content-type')).toBe('text/html; charset=utf-8');
    const policy = response.headers.get('content-security-policy') ?? '';
    expect(policy).toContain("script-src 'self' 'wasm-unsafe-eval';");
    expect(policy).toContain("worker-src 'self' blob:;");
    expect(policy).toContain("frame-ancestors 'none'");
    expect(response.headers.get('x-content-type-options')).toBe('nosniff');
    expect(response.headers.get('referrer-policy')).toBe('no-referrer');
  });

  it('lets a browser keep assets for good and asks anew for the rest', async () => {
    expect((await app.request('/assets/part-1a2b.js')).headers.get('cache-control')).toContain('immutable');
    const page = await app.request('/');
    expect(page.headers.get('cache-control')).toBe('no-cache');
    const again = await app.request('/', { headers: { 'If-None-Match': page.headers.get('etag') ?? '' } });
    expect(again.status).toBe(304);
    expect(await again.text()).toBe('');
  });

  it('packs text for those who can unpack it', async () => {
    const headers = { 'Accept-Encoding': 'gzip' };
    const script = await app.request('/assets/part-1a2b.js', { headers });
    expect(script.headers.get('content-encoding')).toBe('gzip');
    expect(script.headers.get('content-type')).toContain('text/javascript');
    expect((await app.request('/assets/part-1a2b.js')).headers.get('content-encoding')).toBeNull();
  });

  it("serves the demo's files as they are, and not what makes them", async () => {
    const night = await app.request('/demo/night.nc');
    expect([...new Uint8Array(await night.arrayBuffer())]).toEqual([67, 68, 70, 1]);
    expect((await app.request('/demo/site.json')).headers.get('content-type')).toContain('application/json');
    expect((await app.request('/demo/generate.ts')).status).toBe(404);
  });

  it.each(['/missing', '/demo/missing', '/demo/../secret.txt', '/%2e%2e/secret.txt', '/assets/..%2f..%2fsecret.txt'])(
    'says in words that nothing lies at %s',
    async (path) => {
      const response = await app.request(path);
      expect(response.status).toBe(404);
      const words = await response.text();
      expect(words).toContain('Nothing lies at');
      expect(words).not.toContain('not for the page');
    },
  );

  it('takes no writing', async () => {
    expect((await app.request('/', { method: 'POST', body: 'x' })).status).toBe(404);
  });
});
