/// <reference types="vitest/config" />
import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vite';

const apiTarget = `http://127.0.0.1:${process.env['GROUNDSEL_PORT'] ?? '4310'}`;
const here = import.meta.dirname;

export default defineConfig({
  root: `${here}/client`,
  plugins: [react(), tailwindcss()],
  build: { outDir: `${here}/.build/client`, emptyOutDir: true, sourcemap: true, chunkSizeWarningLimit: 900 },
  server: { proxy: { '/api': { target: apiTarget } } },
  test: {
    root: here,
    passWithNoTests: true,
    projects: [
      {
        extends: true,
        test: {
          name: 'unit',
          root: here,
          environment: 'node',
          include: ['tests/{analysis,raster,demo,reference,architecture,shared,server}/**/*.test.ts'],
          testTimeout: 60_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'client',
          root: here,
          environment: 'jsdom',
          include: ['tests/client/**/*.test.{ts,tsx}'],
          setupFiles: ['tests/client/setup.ts'],
        },
      },
      {
        extends: true,
        test: {
          name: 'api',
          root: here,
          environment: 'node',
          include: ['tests/api/**/*.test.ts'],
          testTimeout: 60_000,
          hookTimeout: 120_000,
          fileParallelism: false,
        },
      },
      {
        extends: true,
        test: {
          name: 'browser',
          root: here,
          environment: 'node',
          include: ['tests/browser/**/*.test.ts'],
          testTimeout: 300_000,
          hookTimeout: 300_000,
          fileParallelism: false,
        },
      },
    ],
  },
});
