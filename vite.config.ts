import { fileURLToPath } from 'node:url';
import { svelte } from '@sveltejs/vite-plugin-svelte';
import { defineConfig } from 'vite';
import { offline } from './tests/tools/offline.ts';

const path = (relative: string): string => fileURLToPath(new URL(relative, import.meta.url));

/** The editor: its page is `src/app/index.html`, its build `dist/app`. */
export default defineConfig({
  root: path('./src/app'),
  // Relative addresses, so that the build can be served from any folder.
  base: './',
  publicDir: path('./static'),
  cacheDir: path('./node_modules/.vite'),
  plugins: [svelte({ configFile: path('./svelte.config.js') }), offline()],
  // One script without imports, so that the page that opens from disk can start it.
  worker: { format: 'iife' },
  server: { fs: { allow: [path('.')] } },
  build: {
    outDir: path('./dist/app'),
    emptyOutDir: true,
    target: 'es2023',
    // One script: the page that opens from disk can load no other.
    chunkSizeWarningLimit: 4096,
    rolldownOptions: { output: { codeSplitting: false } },
  },
});
