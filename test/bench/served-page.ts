import { type ChildProcess, spawn } from 'node:child_process';
import { createServer } from 'node:net';
import { pathOf } from './places';

/** The built page behind the program's own server, in a process of its own. */
export interface ServedPage {
  readonly address: string;
  stop(): void;
}

/** Serves the built page on a free port. */
export async function servePage(): Promise<ServedPage> {
  const port = await freePort();
  const server = spawn(process.execPath, [pathOf('workers/dist/serve.mjs')], {
    stdio: ['ignore', 'pipe', 'inherit'],
    env: { ...process.env, PORT: String(port) },
  });
  await said(server);
  return { address: `http://127.0.0.1:${port}/`, stop: () => server.kill() };
}

/** Waits until the server has said its address. */
function said(server: ChildProcess): Promise<void> {
  return new Promise((resolve, reject) => {
    server.stdout?.once('data', () => resolve());
    server.once('close', () => reject(new Error('the page could not be served')));
  });
}

function freePort(): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address();
      probe.close(() =>
        typeof address === 'object' && address
          ? resolve(address.port)
          : reject(new Error('no free port')),
      );
    });
  });
}
