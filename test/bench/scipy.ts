import { type ChildProcess, spawn, spawnSync } from 'node:child_process';
import { createInterface, type Interface } from 'node:readline';
import type { Timed } from './measured';
import { pathOf } from './places';

const PYTHON = '/usr/bin/python3';

/** One thread, and the library's own choice of its inner loops whatever the shell says. */
function quietEnvironment(): NodeJS.ProcessEnv {
  const { OPENBLAS_CORETYPE: _core, OPENBLAS_L2_SIZE: _cache, ...rest } = process.env;
  return { ...rest, OPENBLAS_NUM_THREADS: '1', OMP_NUM_THREADS: '1', MKL_NUM_THREADS: '1' };
}

/** Versions of numpy and scipy there, or null with one line said where scipy cannot be imported. */
export function scipyVersion(say: (line: string) => void): string | null {
  const { status, stdout } = spawnSync(
    PYTHON,
    ['-c', 'import numpy, scipy.signal as s, scipy; print(scipy.__version__, numpy.__version__)'],
    { encoding: 'utf8', env: quietEnvironment() },
  );
  if (status === 0) return stdout.trim().replace(' ', ', numpy ');
  say(`scipy: skipped, ${PYTHON} cannot import it (Debian: apt-get install python3-scipy)`);
  return null;
}

/** A script that does what it is asked by name, one line an answer, so that both sides can take turns. */
export interface ScipyScript {
  /** Runs one of the script's pipelines once and says how long it took, reading and writing left out. */
  time(pipeline: string): Promise<Timed>;
  end(): void;
}

/** Starts a script of this folder. Throws, with what it wrote, where it ends before its answer. */
export function startScipy(name: string, args: readonly string[]): ScipyScript {
  const child = spawn(PYTHON, [pathOf(`test/bench/${name}`), ...args], {
    stdio: ['pipe', 'pipe', 'inherit'],
    env: quietEnvironment(),
  });
  const lines = createInterface({ input: child.stdout });
  return {
    async time(pipeline) {
      const answer = nextLine(lines, child, name);
      child.stdin.write(`${pipeline}\n`);
      const { processor_ms, clock_ms } = JSON.parse(await answer);
      return { processorMs: Number(processor_ms), clockMs: Number(clock_ms) };
    },
    end: () => child.stdin.end(),
  };
}

function nextLine(lines: Interface, child: ChildProcess, name: string): Promise<string> {
  return new Promise((resolve, reject) => {
    const ended = () => reject(new Error(`${name} ended before its answer`));
    child.once('close', ended);
    lines.once('line', (line) => {
      child.off('close', ended);
      resolve(line);
    });
  });
}
