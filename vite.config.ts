import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';

const apiPort = process.env.PORT ?? '4470';

export default defineConfig({
  plugins: [react(), tailwindcss()],
  build: {
    outDir: 'dist',
    // The content security policy allows no data: addresses, so nothing may be inlined.
    assetsInlineLimit: 0,
    manifest: true,
    // A browser that does not preload modules asks for them a little later; a polyfill would cost every other one.
    modulePreload: { polyfill: false },
  },
  server: {
    host: '127.0.0.1',
    proxy: { '/api': `http://127.0.0.1:${apiPort}` },
  },
  test: {
    // Every core: the suite has ten minutes.
    maxWorkers: '100%',
    // `npm run coverage`: the folders that decide what a bill should have been, and what the money comes to, are to have every branch tried.
    coverage: {
      provider: 'v8',
      include: ['settlement', 'reconcile', 'books', 'position', 'try'].map((folder) => `shared/${folder}/**/*.ts`),
      reporter: ['text', 'json'],
      reportOnFailure: true,
      thresholds: {
        'shared/settlement/**': { branches: 100 },
        'shared/reconcile/**': { branches: 100 },
        'shared/books/**': { branches: 100 },
        'shared/position/**': { branches: 100 },
        'shared/try/**': { branches: 100 },
      },
    },
    projects: [
      { extends: true, test: { name: 'unit', include: ['tests/unit/**/*.test.{ts,tsx}'] } },
      { extends: true, test: { name: 'standards', include: ['tests/standards/**/*.test.ts'] } },
      {
        extends: true,
        test: { name: 'api', include: ['tests/api/**/*.test.ts'], testTimeout: 30_000, hookTimeout: 60_000 },
      },
      {
        extends: true,
        test: {
          name: 'browser',
          include: ['tests/browser/**/*.test.ts'],
          testTimeout: 120_000,
          hookTimeout: 180_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
