import { defineConfig } from 'vitest/config';
import { playwright } from '@vitest/browser-playwright';
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { chromiumArguments, findBrowser } from './tests/support/browser.mjs';

/** Command line build: one ES module for Node that keeps the packages it uses outside. */
const commandLine = {
  build: {
    ssr: fileURLToPath(new URL('./src/cli/main.ts', import.meta.url)),
    outDir: 'dist/cli',
    target: 'node20',
    emptyOutDir: true,
    rollupOptions: { output: { entryFileNames: 'main.js', format: 'es' as const } },
  },
};

/** The content-security policy of index.html, sent as a header too: a worker obeys only the header of its own script. */
function pagePolicy(): string {
  const html = readFileSync(new URL('./index.html', import.meta.url), 'utf8');
  return /Content-Security-Policy"\s+content="([^"]+)"/.exec(html)?.[1] ?? "default-src 'none'";
}

/** Page build: everything below `dist/page`, no request after load. */
const page = {
  base: './',
  build: { outDir: 'dist/page', target: 'es2022', emptyOutDir: true, assetsInlineLimit: 0 },
  worker: { format: 'es' as const },
  preview: { headers: { 'Content-Security-Policy': pagePolicy() } },
  optimizeDeps: { include: ['lit', 'lit/directives/live.js', 'gl-matrix', 'three'] },
};

export default defineConfig(({ mode }) => ({
  ...(mode === 'cli' ? commandLine : page),
  test: {
    projects: [
      {
        extends: true,
        test: {
          name: 'node',
          environment: 'node',
          include: ['tests/{unit,laws,outside,fuzz,cli,guard}/**/*.test.ts'],
          testTimeout: 60_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'bench',
          environment: 'node',
          include: ['tests/bench/**/*.bench-test.ts'],
          testTimeout: 600_000,
        },
      },
      {
        extends: true,
        test: {
          name: 'browser',
          include: ['tests/{components,gpu,pictures}/**/*.test.ts'],
          testTimeout: 60_000,
          browser: {
            enabled: true,
            headless: true,
            screenshotFailures: false,
            provider: playwright({
              launchOptions: { executablePath: findBrowser() ?? '/nonexistent', args: chromiumArguments },
            }),
            instances: [{ browser: 'chromium' }],
          },
        },
      },
    ],
  },
}));
