import { cpus, loadavg, totalmem } from 'node:os';

const GIB = 1024 ** 3;

/** The machine in one line: times mean nothing without it. */
export function machineFacts(): string {
  const all = cpus();
  const model = all[0]?.model.trim().replaceAll(/\s+/g, ' ') || 'unknown processor';
  const memory = Math.round(totalmem() / GIB);
  return `${all.length} cores (${model}), ${memory} GB, Node ${process.version}, ${loadWords()}`;
}

/** How busy the machine was over the last minute; above the number of cores, times by the clock are too long. */
export const loadWords = (): string => `load ${loadavg()[0].toFixed(1)}`;
