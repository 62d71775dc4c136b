import { defineConfig } from 'playwright/test';
import { BROWSER_FLAGS, findBrowser } from './browser.mjs';

const PORT = Number(process.env.E2E_PORT ?? 4391);
const browser = findBrowser();

export default defineConfig({
  testDir: '.',
  testMatch: '*.spec.ts',
  outputDir: '../node_modules/.cache/e2e',
  timeout: 120_000,
  expect: { timeout: 20_000 },
  fullyParallel: false,
  workers: 1,
  forbidOnly: true,
  retries: process.env.CI ? 1 : 0,
  reporter: [['list'], ['json', { outputFile: '../node_modules/.cache/e2e-results.json' }]],
  use: {
    baseURL: `http://127.0.0.1:${PORT}/`,
    viewport: { width: 1280, height: 720 },
    launchOptions: {
      args: BROWSER_FLAGS,
      ...(browser ? { executablePath: browser } : {}),
    },
  },
  webServer: {
    command: 'node workers/dist/serve.mjs',
    cwd: '..',
    env: { PORT: String(PORT) },
    url: `http://127.0.0.1:${PORT}/`,
    reuseExistingServer: false,
  },
});
