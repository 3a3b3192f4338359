import { mkdirSync, mkdtempSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import http from 'node:http';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

interface ServerModule {
  fileOf(address: string, within?: readonly string[]): string | null;
  serve(options: { port: number; next?: boolean }): Promise<{ server: http.Server; address: string }>;
  contentSecurityPolicy: string;
}
const { fileOf, serve, contentSecurityPolicy } = (await import(
  /* @vite-ignore */ new URL('../../scripts/server.mjs', import.meta.url).href
)) as ServerModule;

describe('which file an address stands for', () => {
  const top = mkdtempSync(path.join(tmpdir(), 'plumbtick-pages-'));
  const pages = path.join(top, 'pages');
  mkdirSync(path.join(pages, 'sub'), { recursive: true });
  mkdirSync(path.join(pages, '.hidden'));
  for (const name of [
    'secret.txt',
    'pages/index.html',
    'pages/a b.html',
    'pages/sub/index.html',
    'pages/.hidden/x',
    'pages/.env',
  ])
    writeFileSync(path.join(top, name), name);
  symlinkSync(path.join(top, 'secret.txt'), path.join(pages, 'link.txt'));
  afterAll(() => rmSync(top, { recursive: true, force: true }));
  const of = (address: string) => {
    const file = fileOf(address, [pages]);
    return file === null ? null : path.relative(pages, file);
  };

  it('finds pages, folders by their index, encoded names; drops query and fragment', () => {
    expect(of('/')).toBe('index.html');
    expect(of('/a%20b.html?x=1#y')).toBe('a b.html');
    expect(of('/sub/')).toBe(path.join('sub', 'index.html'));
  });

  it.each([
    '/../secret.txt',
    '/..%2fsecret.txt',
    '/%2e%2e/secret.txt',
    '/sub/../../secret.txt',
    '/..\\secret.txt',
    '//etc/passwd',
    '/link.txt',
    '/.env',
    '/.hidden/x',
    '/%',
    '/index.html%00.txt',
    'http://elsewhere/index.html',
    '/sub',
    '/none.html',
  ])('refuses %s', (address) => expect(of(address)).toBeNull());
});

describe('the server', () => {
  let running: Awaited<ReturnType<typeof serve>>;
  beforeAll(async () => {
    running = await serve({ port: 0 });
  });
  afterAll(() => {
    running.server.close();
    running.server.closeAllConnections();
  });

  /** A request whose path goes out as it is: fetch would tidy the dots away. */
  const request = (pathName: string, method = 'GET') =>
    new Promise<http.IncomingMessage>((resolve, reject) => {
      const { port } = new URL(running.address);
      http
        .request({ host: '127.0.0.1', port, path: pathName, method }, (response) => {
          response.resume();
          resolve(response);
        })
        .on('error', reject)
        .end();
    });

  it('answers with the strict policy and the right kinds', async () => {
    const missing = await request('/none.html');
    expect(missing.statusCode).toBe(404);
    expect(missing.headers['content-security-policy']).toBe(contentSecurityPolicy);
    expect(contentSecurityPolicy).toMatch(/^default-src 'none'; script-src 'self'; style-src 'self';/);
    expect(missing.headers['x-content-type-options']).toBe('nosniff');
  });

  it('never leaves its folders', async () => {
    for (const address of ['/../package.json', '/%2e%2e/package.json', '/..%2fpackage.json'])
      expect((await request(address)).statusCode, address).toBe(404);
  });

  it('takes GET and HEAD alone', async () => {
    for (const method of ['POST', 'PUT', 'DELETE']) expect((await request('/', method)).statusCode, method).toBe(405);
  });

  it('listens on this machine alone, and takes the next port if one is taken', async () => {
    const { port, address } = running.server.address() as { port: number; address: string };
    expect(address).toBe('127.0.0.1');
    const second = await serve({ port });
    const other = (second.server.address() as { port: number }).port;
    second.server.close();
    expect(other).toBeGreaterThan(port);
  });
});
