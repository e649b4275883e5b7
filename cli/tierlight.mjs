#!/usr/bin/env node
import { register } from 'tsx/esm/api'
import { dirname, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'

/** The command line: TypeScript runs as it is, so there is nothing to build and no database to start. */
const root = resolve(dirname(fileURLToPath(import.meta.url)), '..')
register({ tsconfig: resolve(root, 'tsconfig.server.json') })
const { main } = await import('./main.ts')
process.exitCode = await main(process.argv.slice(2), {
  out: (text) => process.stdout.write(text),
  err: (text) => process.stderr.write(text),
})
