// Serves the pages of sites/ and the built files of dist/ to this machine only, under the policy that a strict site would set:
// what works here works where no inline script, no inline style and no foreign request is allowed.
import fs from 'node:fs';
import http from 'node:http';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('..', import.meta.url));

const types = {
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.mjs': 'text/javascript; charset=utf-8',
  '.css': 'text/css; charset=utf-8',
  '.json': 'application/json; charset=utf-8',
  '.map': 'application/json; charset=utf-8',
  '.txt': 'text/plain; charset=utf-8',
  '.md': 'text/markdown; charset=utf-8',
  '.csv': 'text/csv; charset=utf-8',
  '.svg': 'image/svg+xml',
  '.png': 'image/png',
  '.webp': 'image/webp',
  '.ico': 'image/x-icon',
};

export const contentSecurityPolicy =
  "default-src 'none'; script-src 'self'; style-src 'self'; img-src 'self' data:; connect-src 'self'";

const common = { 'X-Content-Type-Options': 'nosniff', 'Referrer-Policy': 'no-referrer', 'Cache-Control': 'no-store' };

/** Pages first, then what is built: so that a page can say `plumbtick.js` beside itself and nothing built is committed. */
const folders = [path.join(root, 'sites'), path.join(root, 'dist')];

/** The file behind an address, or null; never one outside the folders, by dots, by encoded dots or by a symbolic link. */
export function fileOf(address, within = folders) {
  let pathname;
  try {
    pathname = decodeURIComponent(address.split(/[?#]/, 1)[0]);
  } catch {
    return null;
  }
  if (!pathname.startsWith('/') || pathname.includes('\0') || pathname.includes('\\')) return null;
  if (pathname.split('/').some((part) => part.startsWith('.'))) return null;
  for (const folder of within) {
    let file = path.join(folder, pathname);
    try {
      if (fs.statSync(file).isDirectory()) {
        if (!pathname.endsWith('/')) continue;
        file = path.join(file, 'index.html');
      }
      const real = fs.realpathSync(file);
      if (real.startsWith(fs.realpathSync(folder) + path.sep) && fs.statSync(real).isFile()) return real;
    } catch {
      // not in this folder
    }
  }
  return null;
}

function answer(request, response) {
  const refuse = (status, text, more = {}) => {
    response.writeHead(status, {
      ...common,
      ...more,
      'Content-Type': types['.txt'],
      'Content-Security-Policy': contentSecurityPolicy,
    });
    response.end(request.method === 'HEAD' ? undefined : `${text}\n`);
  };
  if (request.method !== 'GET' && request.method !== 'HEAD')
    return refuse(405, 'Only GET and HEAD are answered here.', { Allow: 'GET, HEAD' });
  const file = fileOf(request.url ?? '/');
  if (file === null) return refuse(404, 'There is no such page.');
  let body;
  try {
    body = fs.readFileSync(file);
  } catch {
    return refuse(404, 'There is no such page.');
  }
  response.writeHead(200, {
    ...common,
    'Content-Type': types[path.extname(file)] ?? 'application/octet-stream',
    'Content-Length': body.length,
    // the self-contained page brings its own policy: its script is inline, allowed by its hash alone
    ...(path.basename(file) === 'standalone.html' ? {} : { 'Content-Security-Policy': contentSecurityPolicy }),
  });
  response.end(request.method === 'HEAD' ? undefined : body);
}

/** Listens on the port wanted or, if `next` and it is taken, on the next free one. Returns the server and its address. */
export function serve({ port, next = true }) {
  return new Promise((resolve, reject) => {
    const server = http.createServer(answer);
    let at = port;
    server.on('error', (error) => {
      if (error.code !== 'EADDRINUSE' || !next || at >= port + 50 || at >= 65_535) return reject(error);
      at += 1;
      server.listen(at, '127.0.0.1');
    });
    server.on('listening', () => resolve({ server, address: `http://localhost:${server.address().port}/` }));
    server.listen(at, '127.0.0.1');
  });
}
