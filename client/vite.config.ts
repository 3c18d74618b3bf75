import { fileURLToPath } from 'node:url';
import { defineConfig } from 'vite';

const here = (path: string): string => fileURLToPath(new URL(path, import.meta.url));

/** Hashed files, no script inside the page: the server sends a content security policy that forbids those. */
export default defineConfig({
  root: here('.'),
  base: '/',
  build: {
    outDir: here('../.build/client'),
    emptyOutDir: true,
    target: 'es2022',
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
    reportCompressedSize: false,
  },
});
