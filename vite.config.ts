import { defineConfig } from 'vite';

/** The web page: built from web/ into dist/web, served by the same process as the API. */
export default defineConfig({
  root: 'web',
  oxc: { jsx: { runtime: 'automatic', importSource: 'preact' } },
  build: { outDir: '../dist/web', emptyOutDir: true, target: 'es2022' },
  server: { proxy: { '/api': 'http://127.0.0.1:4310' } },
});
