// What the house serves over HTTP, apart from listening: tests put requests in, a host puts a socket before it.

import { serveStatic } from '@hono/node-server/serve-static';
import { Hono } from 'hono';
import { compress } from 'hono/compress';
import { etag } from 'hono/etag';
import { secureHeaders } from 'hono/secure-headers';

export interface AppFolders {
  /** Folder of the built page. */
  readonly board: string;
  /** Folder of the demo's files, served under /demo/. */
  readonly demo: string;
}

/**
 * Only own scripts run, none written into a page. WebAssembly serves the netCDF-4 reader; blob images and workers serve
 * saved pictures and the desk; style attributes are how the axes of the section are placed.
 */
const CONTENT_SECURITY_POLICY = {
  defaultSrc: ["'self'"],
  scriptSrc: ["'self'", "'wasm-unsafe-eval'"],
  workerSrc: ["'self'", 'blob:'],
  styleSrc: ["'self'"],
  styleSrcAttr: ["'unsafe-inline'"],
  imgSrc: ["'self'", 'data:', 'blob:'],
  fontSrc: ["'self'", 'data:'],
  connectSrc: ["'self'"],
  objectSrc: ["'none'"],
  baseUri: ["'none'"],
  formAction: ["'none'"],
  frameAncestors: ["'none'"],
};

/** The application: the page at /, the demo's files at /demo/. */
export function createApp(folders: AppFolders): Hono {
  const app = new Hono();
  app.use(
    secureHeaders({
      contentSecurityPolicy: CONTENT_SECURITY_POLICY,
      // The page is served on the site's own network, mostly without TLS; a host that adds TLS adds this too.
      strictTransportSecurity: false,
      xFrameOptions: 'DENY',
      referrerPolicy: 'no-referrer',
    }),
  );
  app.use(compress());

  // Names under assets/ carry a digest of the content: a browser may keep them for good. All else is asked for anew.
  app.use('/assets/*', async (context, next) => {
    await next();
    if (context.res.ok) context.header('Cache-Control', 'public, max-age=31536000, immutable');
  });
  const revalidated = etag();
  app.use(async (context, next) => {
    if (context.req.path.startsWith('/assets/')) return next();
    await revalidated(context, next);
    context.header('Cache-Control', 'no-cache');
  });

  // The generator lies beside the files it makes; it is no part of the demo.
  app.get('/demo/*', async (context, next) => (context.req.path.endsWith('.ts') ? context.notFound() : next()));
  app.get('/demo/*', serveStatic({ root: folders.demo, rewriteRequestPath: (path) => path.slice('/demo'.length) }));
  app.get('*', serveStatic({ root: folders.board }));
  app.notFound((context) => context.text(`Nothing lies at ${context.req.path}.\n`, 404));
  return app;
}
