import { defineConfig } from 'vite';

/** Server and command line in one file (in mode "bench" the bench); only the native SQLite binding stays outside the bundle. */
export default defineConfig(({ mode }) => ({
  ssr: { noExternal: true, external: ['better-sqlite3'] },
  build: {
    ssr: mode === 'bench' ? 'test/bench/bench.ts' : 'server/main.ts',
    outDir: mode === 'bench' ? 'dist/bench' : 'dist/server',
    emptyOutDir: true,
    target: 'node20',
    sourcemap: true,
    rollupOptions: { output: { entryFileNames: 'main.js' } },
  },
}));
