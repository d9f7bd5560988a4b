// Owns how the program is built, served and tested: the browser app, the command line (`--mode cli`), the test runner.
// Must not know what any of them does.
import { cpSync } from 'node:fs';
import react from '@vitejs/plugin-react';
import type { Plugin, UserConfig } from 'vite';
import { defineConfig } from 'vitest/config';
import type { ViteUserConfig } from 'vitest/config';

// Shared memory needs a page that is isolated from other origins.
const ISOLATION = {
  'Cross-Origin-Opener-Policy': 'same-origin',
  'Cross-Origin-Embedder-Policy': 'require-corp',
};

const CONTENT_SECURITY_POLICY = [
  "default-src 'self'",
  "script-src 'self' 'wasm-unsafe-eval'",
  "style-src 'self' 'unsafe-inline'",
  "img-src 'self' blob: data:",
  "worker-src 'self' blob:",
  "connect-src 'self'",
  "object-src 'none'",
  "base-uri 'none'",
].join('; ');

export default defineConfig(({ mode }) => (mode === 'cli' ? cliConfig() : { ...appConfig(), test: testConfig() }));

function appConfig(): UserConfig {
  return {
    base: './',
    plugins: [react(), contentSecurityPolicy()],
    // A small .wasm turned into a data URL would be blocked by the policy.
    build: { outDir: 'dist/app', assetsInlineLimit: 0, target: 'es2022' },
    worker: { format: 'es' },
    server: { headers: ISOLATION },
    preview: { headers: ISOLATION },
  };
}

/** The command line as one file, with every dependency inside and the kernels beside it: it runs without node_modules. */
function cliConfig(): UserConfig {
  return {
    publicDir: false,
    plugins: [runtimeFilesBeside('dist/cli')],
    ssr: { noExternal: true },
    build: {
      ssr: 'src/cli/guidewall.ts',
      outDir: 'dist/cli',
      target: 'node20',
      rolldownOptions: { output: { entryFileNames: 'guidewall.mjs', codeSplitting: false } },
    },
  };
}

function testConfig(): NonNullable<ViteUserConfig['test']> {
  return {
    environment: 'node',
    include: ['test/{unit,property,parity,evidence}/**/*.test.{ts,tsx}'],
    // The counts for `npm test`, and the table of evidence.
    reporters: ['default', ['json', { outputFile: 'test-results/vitest.json' }], './test/evidence/evidence-reporter.ts'],
  };
}

/** In the built page only: the development server's hot reload needs inline scripts. */
function contentSecurityPolicy(): Plugin {
  return {
    name: 'content-security-policy',
    apply: 'build',
    transformIndexHtml: () => [
      {
        tag: 'meta',
        attrs: { 'http-equiv': 'Content-Security-Policy', content: CONTENT_SECURITY_POLICY },
        injectTo: 'head-prepend',
      },
    ],
  };
}

/** `new URL('./kernel/kernel.wasm', import.meta.url)` and the like stay as written in a build for Node; this puts the files there. */
function runtimeFilesBeside(directory: string): Plugin {
  const files = ['kernel/kernel.wasm', 'kernel/kernel-shared.wasm', 'helper.node.mjs', 'kernel-imports.mjs'];
  return {
    name: 'runtime-files-beside',
    closeBundle: () => files.forEach((file) => cpSync(`workers/${file}`, `${directory}/${file}`)),
  };
}
