import * as account from './account.js'
import * as administration from './administration.js'
import * as devices from './devices.js'
import * as jobs from './jobs.js'
import * as matching from './matching.js'
import * as projects from './projects.js'
import type { Route } from './route.js'
import * as scanChecks from './scanChecks.js'
import * as scans from './scans.js'
import * as spectra from './spectra.js'

function routesOf(module: Record<string, unknown>): Route[] {
  return Object.values(module).filter(
    (value): value is Route => typeof value === 'object' && value !== null && 'method' in value && 'path' in value,
  )
}

/** Every route of the API, in the order of the document. A new contract file is one line here. */
export const ROUTES: readonly Route[] = [
  account,
  projects,
  devices,
  matching,
  scans,
  scanChecks,
  jobs,
  spectra,
  administration,
].flatMap(routesOf)
