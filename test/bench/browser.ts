import { readdirSync, readFileSync } from 'node:fs';
import type { Browser, CDPSession } from 'playwright';
import { pathOf } from './places';

/** What e2e/browser.mjs gives; loaded when it runs, since it finds the browser for the test command as it is. */
interface BrowserFinder {
  readonly BROWSER_FLAGS: readonly string[];
  readonly findBrowser: () => string | null;
}

/** A browser of this machine, or null with one line said where there is none. */
export async function startBrowser(say: (line: string) => void): Promise<Browser | null> {
  const finder: BrowserFinder = await import(/* @vite-ignore */ pathOf('e2e/browser.mjs'));
  const executablePath = finder.findBrowser();
  if (executablePath === null) {
    say('opening: skipped, no browser found (CHROMIUM=/path names one)');
    return null;
  }
  const { chromium } = await import('playwright');
  return chromium.launch({ executablePath, args: [...finder.BROWSER_FLAGS] });
}

/** The process that holds a page and its workers, as Linux tells of it; NaN on other systems. */
export interface Renderer {
  /** Processor time so far, in ms: of the page's thread, of its workers, of all threads. */
  readonly pageMs: number;
  readonly workerMs: number;
  readonly allMs: number;
  /** How long the page's thread and its workers' have waited for a core that other work held, in ms. */
  readonly pageWaitMs: number;
  readonly workerWaitMs: number;
  /** Peak resident memory so far (VmHWM). */
  readonly peakMB: number;
}

/** The page process of a browser with one page: of several the one that has worked most. */
export async function rendererOf(session: CDPSession): Promise<Renderer> {
  const { processInfo } = await session.send('SystemInfo.getProcessInfo');
  const [busiest] = processInfo
    .filter(({ type }) => type === 'renderer')
    .sort((a, b) => b.cpuTime - a.cpuTime);
  const allMs = 1000 * (busiest?.cpuTime ?? Number.NaN);
  const unknown = { time: Number.NaN, wait: Number.NaN };
  try {
    const pid = busiest?.id ?? 0;
    return rendererFrom(allMs, threadsOf(pid), peakMBOf(pid));
  } catch {
    return rendererFrom(allMs, { page: unknown, worker: unknown }, Number.NaN);
  }
}

interface Used {
  readonly time: number;
  readonly wait: number;
}

const rendererFrom = (
  allMs: number,
  { page, worker }: { readonly page: Used; readonly worker: Used },
  peakMB: number,
): Renderer => ({
  pageMs: page.time,
  workerMs: worker.time,
  allMs,
  pageWaitMs: page.wait,
  workerWaitMs: worker.wait,
  peakMB,
});

function peakMBOf(pid: number): number {
  const status = readFileSync(`/proc/${pid}/status`, 'utf8');
  return Number(/^VmHWM:\s+(\d+) kB$/m.exec(status)?.[1] ?? Number.NaN) / 1024;
}

/** Processor time and waiting of the page's own thread and of all workers (schedstat of /proc, ns). */
function threadsOf(pid: number): { readonly page: Used; readonly worker: Used } {
  const page = { time: 0, wait: 0 };
  const worker = { time: 0, wait: 0 };
  for (const thread of readdirSync(`/proc/${pid}/task`)) {
    const name = readFileSync(`/proc/${pid}/task/${thread}/comm`, 'utf8');
    const into = Number(thread) === pid ? page : name.startsWith('DedicatedWorker') ? worker : null;
    if (!into) continue;
    const stat = readFileSync(`/proc/${pid}/task/${thread}/schedstat`, 'utf8');
    const [runNs, waitNs] = stat.split(' ').map(Number);
    into.time += runNs / 1e6;
    into.wait += waitNs / 1e6;
  }
  return { page, worker };
}
