#!/usr/bin/env node
import { checkNode, ensurePackages } from '../server/setup/prepare.mjs'

/** In a fresh clone the packages are installed first, with a word on stderr; then the command runs. */
checkNode()
ensurePackages()
await import('./tierlight.mjs')
