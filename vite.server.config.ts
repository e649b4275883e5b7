import { existsSync } from 'node:fs'
import { defineConfig } from 'vite'

/** The server as one bundle a program; packages stay outside. A worker is a program of its own. */
const PROGRAMS = {
  main: 'server/main.ts',
  'reading/worker': 'server/reading/worker.ts',
  'jobs/checksWorker': 'server/jobs/checksWorker.ts',
}

export default defineConfig({
  publicDir: false,
  build: {
    ssr: true,
    outDir: 'dist/server',
    emptyOutDir: true,
    target: 'node20',
    sourcemap: true,
    rolldownOptions: {
      input: Object.fromEntries(Object.entries(PROGRAMS).filter(([, file]) => existsSync(file))),
      output: { entryFileNames: '[name].js', chunkFileNames: 'chunks/[name]-[hash].js', format: 'es' },
    },
  },
})
