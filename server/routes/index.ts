import type { MakeRouter } from '../app.js'
import { accountRouter } from './account.js'
import { administrationRouter } from './administration.js'
import { apiDocumentRouter } from './apiDocument.js'
import { benchRouter } from './bench.js'
import { devicesRouter } from './devices.js'
import { matchingRouter } from './matching.js'
import { measuringRouter } from './measuring.js'
import { peopleRouter } from './people.js'
import { projectsRouter } from './projects.js'
import { rawPassesRouter } from './rawPasses.js'
import { scanChecksRouter } from './scanChecks.js'
import { scansRouter } from './scans.js'
import { scenariosRouter } from './scenarios.js'
import { sourceFilesRouter } from './sourceFiles.js'
import { spectraRouter } from './spectra.js'
import { whatIfRouter } from './whatIf.js'

/** Every router. A new resource is one file and one line here. */
export const ROUTERS: readonly MakeRouter[] = [
  accountRouter,
  projectsRouter,
  peopleRouter,
  devicesRouter,
  matchingRouter,
  scansRouter,
  scanChecksRouter,
  rawPassesRouter,
  measuringRouter,
  benchRouter,
  sourceFilesRouter,
  spectraRouter,
  whatIfRouter,
  scenariosRouter,
  administrationRouter,
  apiDocumentRouter,
]
