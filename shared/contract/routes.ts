import * as account from './account.js'
import * as administration from './administration.js'
import * as bench from './bench.js'
import * as biasPlan from './biasPlan.js'
import * as biasSeries from './biasSeries.js'
import * as devices from './devices.js'
import * as jobs from './jobs.js'
import * as matching from './matching.js'
import * as materials from './materials.js'
import * as projects from './projects.js'
import * as rawPasses from './rawPasses.js'
import type { Route } from './route.js'
import * as scanChecks from './scanChecks.js'
import * as scans from './scans.js'
import * as scenarios from './scenarios.js'
import * as spectra from './spectra.js'
import * as unmixing from './unmixing.js'
import * as whatIf from './whatIf.js'

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
  biasSeries,
  rawPasses,
  unmixing,
  biasPlan,
  bench,
  jobs,
  spectra,
  materials,
  whatIf,
  scenarios,
  administration,
].flatMap(routesOf)
