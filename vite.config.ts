import { defineConfig } from 'vitest/config';
import { playwright } from '@vitest/browser-playwright';
import { readFileSync } from 'node:fs';
import { dirname, resolve } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Plugin } from 'vite';
import { leanThree } from './src/render/lean-three.ts';
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

const workerAddress = /new URL\(\s*'(\.\/[\w-]+-worker\.ts)',\s*import\.meta\.url,?\s*\)/g;

/**
 * Builds `new URL('./NAME-worker.ts', import.meta.url)` as one more entry of the page's own build. Vite alone builds each
 * worker apart, with its own copy of all it uses; so the page and its workers share their files instead.
 */
function sharedWorkers(): Plugin {
  return {
    name: 'shared-workers',
    apply: 'build',
    enforce: 'pre',
    transform(code, id) {
      if (!id.endsWith('.ts') || code.search(workerAddress) < 0) return null;
      const entry = (name: string) => this.emitFile({ type: 'chunk', id: resolve(dirname(id), name) });
      const withEntries = code.replace(
        workerAddress,
        (_all, name: string) => `import.meta.ROLLUP_FILE_URL_${entry(name)}`,
      );
      return { code: withEntries, map: null };
    },
  };
}

/**
 * `import()` as the browser has it. Vite wraps each one in a helper that fetches style sheets first; there is one style sheet
 * here, named by index.html, and the helper needs `document`, which a worker lacks.
 */
function plainImports(): Plugin {
  return {
    name: 'plain-imports',
    apply: 'build',
    enforce: 'pre',
    load: (id) =>
      id === '\0vite/preload-helper.js' ? 'export const __vitePreload = (load) => load();' : null,
  };
}

/** Page build: everything below `dist/page`, no request after load. */
const page = {
  base: './',
  plugins: [leanThree(), plainImports(), sharedWorkers()],
  build: {
    outDir: 'dist/page',
    target: 'es2022',
    emptyOutDir: true,
    assetsInlineLimit: 0,
    modulePreload: false as const,
  },
  worker: { format: 'es' as const },
  preview: { headers: { 'Content-Security-Policy': pagePolicy() } },
  optimizeDeps: {
    include: ['lit', 'lit/directives/live.js', 'gl-matrix', 'three/src/Three.js', '@spglib/moyo-wasm'],
    rolldownOptions: { plugins: [leanThree()] },
  },
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
