import { createReadStream } from 'node:fs';
import { stat } from 'node:fs/promises';
import { createServer, type Server, type ServerResponse } from 'node:http';
import { extname, join, normalize, sep } from 'node:path';
import { fileURLToPath } from 'node:url';

const HOST = '127.0.0.1';
const FIRST_PORT = 4317;
const PORTS_TRIED = 20;

const CONTENT_TYPES: Readonly<Record<string, string>> = {
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.css': 'text/css; charset=utf-8',
  '.json': 'application/json; charset=utf-8',
  '.svg': 'image/svg+xml',
  '.png': 'image/png',
  '.wasm': 'application/wasm',
  '.webmanifest': 'application/manifest+json',
};

/** A server of the built folder for this machine only; the page needs no other server. */
export function createStaticServer(folder: string): Server {
  return createServer((request, response) => {
    const path = safePath(folder, request.url ?? '/');
    if (path === null) {
      refuse(response, 400, 'No such address.');
      return;
    }
    void sendFile(path, response);
  });
}

function safePath(folder: string, url: string): string | null {
  try {
    const { pathname } = new URL(url, 'http://localhost');
    const inside = normalize(join(folder, decodeURIComponent(pathname)));
    if (inside !== folder && !inside.startsWith(folder + sep)) return null;
    return pathname.endsWith('/') ? join(inside, 'index.html') : inside;
  } catch {
    return null;
  }
}

async function sendFile(path: string, response: ServerResponse): Promise<void> {
  try {
    const { size } = await stat(path).then((found) => {
      if (!found.isFile()) throw new Error('not a file');
      return found;
    });
    response.writeHead(200, {
      'content-type': CONTENT_TYPES[extname(path)] ?? 'application/octet-stream',
      'content-length': size,
      'cache-control': 'no-cache',
      'x-content-type-options': 'nosniff',
    });
    createReadStream(path).pipe(response);
  } catch {
    refuse(response, 404, 'Not found.');
  }
}

function refuse(response: ServerResponse, status: number, words: string): void {
  response.writeHead(status, { 'content-type': 'text/plain; charset=utf-8' });
  response.end(words);
}

function listen(server: Server, port: number, triesLeft: number): void {
  server.once('error', (error: NodeJS.ErrnoException) => {
    if (error.code === 'EADDRINUSE' && triesLeft > 0) listen(server, port + 1, triesLeft - 1);
    else {
      process.stderr.write(`Bicadence could not be served: ${error.message}\n`);
      process.exitCode = 1;
    }
  });
  server.listen(port, HOST, () => {
    server.removeAllListeners('error');
    process.stdout.write(`Bicadence is at http://${HOST}:${port}/  (Ctrl+C ends it)\n`);
  });
}

const asked = Number(process.env.PORT ?? FIRST_PORT);
if (!Number.isInteger(asked) || asked < 0 || asked > 65535) {
  process.stderr.write(`PORT is "${process.env.PORT}"; it must be a number from 0 to 65535.\n`);
  process.exitCode = 2;
} else {
  const folder = fileURLToPath(new URL('../../dist', import.meta.url));
  listen(createStaticServer(folder), asked, process.env.PORT === undefined ? PORTS_TRIED : 0);
}
