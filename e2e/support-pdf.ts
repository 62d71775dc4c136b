import { execFileSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Page } from 'playwright/test';
import { settled } from './support';

const MISSING =
  'No pdftotext for the tests of the printed report: install poppler-utils (Debian: sudo apt-get install poppler-utils).';

function there(): boolean {
  try {
    execFileSync('pdftotext', ['-v'], { stdio: 'ignore' });
    return true;
  } catch {
    return false;
  }
}

function isDebian(): boolean {
  const file = '/etc/os-release';
  return existsSync(file) && /^ID=debian$/m.test(readFileSync(file, 'utf8'));
}

/** Makes sure that poppler-utils is there: fetched where the run is root on Debian, else a failure in one line. */
export function needPdfTools(): void {
  if (there()) return;
  if (isDebian() && process.getuid?.() === 0) {
    const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
    const apt = (...words: readonly string[]) =>
      execFileSync('apt-get', [...words], { env, stdio: 'ignore' });
    try {
      apt('update', '-qq');
      apt('install', '-y', '-qq', '--no-install-recommends', 'poppler-utils');
    } catch {
      throw new Error(MISSING);
    }
  }
  if (!there()) throw new Error(MISSING);
}

/** The printed report. */
export interface Printed {
  /** Width and height of the paper in points. */
  readonly size: readonly [number, number];
  /** All words in reading order, parted by single blanks. */
  readonly text: string;
  /** Lines of all pages as the eye puts words together. */
  readonly lines: readonly string[];
  /** The letters of each page that are larger than any heading, from the bottom up: the mark that lies across it. */
  readonly marks: readonly string[];
}

/** Prints the page as it stands to a PDF and reads it back. */
export async function printed(page: Page, format: 'A4' | 'Letter'): Promise<Printed> {
  await settled(page);
  const folder = mkdtempSync(join(tmpdir(), 'bicadence-pdf-'));
  try {
    const file = join(folder, 'report.pdf');
    writeFileSync(file, await page.pdf({ format, printBackground: true }));
    const text = execFileSync('pdftotext', [file, '-'], { encoding: 'utf8' });
    const info = execFileSync('pdfinfo', [file], { encoding: 'utf8' });
    const size = /Page size:\s+([\d.]+) x ([\d.]+)/.exec(info) ?? [];
    const boxes = execFileSync('pdftotext', ['-bbox', file, '-'], { encoding: 'utf8' });
    const pages = boxes.split('<page ').slice(1).map(wordsOf);
    return {
      size: [Number(size[1]), Number(size[2])],
      text: text.replaceAll(/\s+/g, ' '),
      lines: pages.flatMap(linesOf),
      marks: pages.map(markOf),
    };
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

const HEADING_PT = 30;
const SAME_LINE_PT = 3;
const WORD = /xMin="([\d.]+)" yMin="([\d.]+)" xMax="[\d.]+" yMax="([\d.]+)">([^<]*)</g;

interface Word {
  readonly x: number;
  readonly y: number;
  readonly high: number;
  readonly word: string;
}

const wordsOf = (page: string): readonly Word[] =>
  [...page.matchAll(WORD)].map(([, x, top, bottom, word]) => ({
    x: Number(x),
    y: (Number(top) + Number(bottom)) / 2,
    high: Number(bottom) - Number(top),
    word,
  }));

/** The letters that are larger than any heading, from the bottom up. */
const markOf = (words: readonly Word[]): string =>
  words
    .filter(({ high }) => high > HEADING_PT)
    .toSorted((a, b) => b.y - a.y)
    .map(({ word }) => word)
    .join('');

/** The lines of a page by the places of their words; a mark that lies across them is left out. */
function linesOf(words: readonly Word[]): readonly string[] {
  const lines: Word[][] = [];
  for (const word of words.filter(({ high }) => high <= HEADING_PT).toSorted((a, b) => a.y - b.y)) {
    const line = lines.at(-1);
    if (line && word.y - line[0].y < SAME_LINE_PT) line.push(word);
    else lines.push([word]);
  }
  return lines.map((line) =>
    line
      .toSorted((a, b) => a.x - b.x)
      .map(({ word }) => word)
      .join(' '),
  );
}
