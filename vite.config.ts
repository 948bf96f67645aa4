import { fileURLToPath } from 'node:url';
import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

const root = fileURLToPath(new URL('.', import.meta.url));
const inProject = (place: string) => `${root}${place}`;

const outsideClient = ['engine', 'domain', 'store', 'use-cases', 'http', 'jobs', 'adapters'];
const fast = ['architecture', 'boot', 'stripe-mock', 'mail-stand-in', 'seeds', 'contracts'];
const seconds = 1000;

export default defineConfig({
  root: inProject('client'),
  plugins: [react(), tailwindcss()],
  build: {
    outDir: inProject('dist/client'),
    emptyOutDir: true,
    target: 'es2022',
    assetsInlineLimit: 0,
    chunkSizeWarningLimit: 900,
  },
  server: {
    // The style sheets and marks live beside the client's own folder.
    fs: { allow: [root] },
    // The host stays as the page named it: the server takes changes from its own origin only.
    proxy: {
      '/api': {
        target: process.env.TOCKWELL_API_URL ?? 'http://127.0.0.1:4311',
        changeOrigin: false,
      },
    },
  },
  test: {
    root,
    pool: 'forks',
    maxWorkers: 2,
    testTimeout: 30 * seconds,
    hookTimeout: 60 * seconds,
    coverage: {
      provider: 'v8',
      include: ['server/engine/**', 'server/domain/**'],
      reporter: ['text-summary', 'text'],
      thresholds: { lines: 95 },
    },
    projects: [
      {
        extends: true,
        test: {
          name: 'server',
          environment: 'node',
          include: [...outsideClient, ...fast].map((part) => `tests/${part}/**/*.test.{ts,mjs}`),
        },
      },
      {
        extends: true,
        test: {
          name: 'client',
          environment: 'jsdom',
          include: ['tests/client/**/*.test.{ts,tsx}'],
        },
      },
      {
        extends: true,
        test: {
          name: 'e2e',
          environment: 'node',
          include: ['tests/e2e/**/*.test.ts'],
          testTimeout: 120 * seconds,
          hookTimeout: 120 * seconds,
        },
      },
    ],
  },
});
