import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

/** The page's policy: no request but for its own static files, in the worker too (it is started from a blob that inherits this). */
const POLICY = [
  "default-src 'none'",
  "script-src 'self' 'wasm-unsafe-eval'",
  "worker-src 'self' blob:",
  "style-src 'self'",
  "img-src 'self' data: blob:",
  "connect-src 'none'",
  "manifest-src 'self'",
  "base-uri 'none'",
  "form-action 'none'",
].join('; ');

const contentSecurityPolicy = {
  name: 'content-security-policy',
  apply: 'build' as const,
  transformIndexHtml: () => [
    {
      tag: 'meta',
      attrs: { 'http-equiv': 'Content-Security-Policy', content: POLICY },
      injectTo: 'head-prepend' as const,
    },
  ],
};

export default defineConfig(({ mode }) => {
  const node = mode === 'node';
  return {
    base: './',
    appType: 'mpa',
    publicDir: node ? false : 'public',
    plugins: node ? [] : [react(), contentSecurityPolicy],
    worker: { format: 'es' },
    build: node
      ? {
          ssr: true,
          outDir: 'workers/dist',
          target: 'node20',
          minify: false,
          rollupOptions: {
            input: {
              analyse: 'workers/analyse.ts',
              serve: 'workers/serve.ts',
              bench: 'test/bench/bench.ts',
            },
            output: { entryFileNames: '[name].mjs', chunkFileNames: 'chunks/[name].mjs' },
          },
        }
      : {
          outDir: 'dist',
          target: 'es2022',
          assetsInlineLimit: 0,
          modulePreload: { polyfill: false },
        },
    test: {
      include: ['test/**/*.test.ts'],
      environment: 'node',
      testTimeout: 60_000,
    },
  };
});
