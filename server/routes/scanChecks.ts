import { Router } from 'express'
import * as jobs from '../../shared/contract/jobs.js'
import * as routes from '../../shared/contract/scanChecks.js'
import type { MakeRouter } from '../app.js'
import { answerFinding } from '../services/checks/answerFinding.js'
import { readScanChecks } from '../services/checks/readScanChecks.js'
import { readThresholds, updateThresholds } from '../services/checks/thresholds.js'
import { withdrawAnswer } from '../services/checks/withdrawAnswer.js'
import { cancelJob, listJobs, readJob, startRecheck } from '../services/jobs/jobsOfProject.js'
import { serve } from './serve.js'

export const scanChecksRouter: MakeRouter = ({ database }) => {
  const router = Router()
  serve(router, routes.readScanChecks, ({ actor, params }) =>
    readScanChecks(database, actor, params.projectId, params.scanId),
  )
  serve(router, routes.answerFinding, ({ actor, params, body }) =>
    answerFinding(database, actor, params.projectId, params.scanId, params.findingId, body),
  )
  serve(router, routes.withdrawAnswer, ({ actor, params }) =>
    withdrawAnswer(database, actor, params.projectId, params.scanId, params.findingId),
  )
  serve(router, routes.readThresholds, ({ actor, params }) => readThresholds(database, actor, params.projectId))
  serve(router, routes.updateThresholds, ({ actor, params, body }) =>
    updateThresholds(database, actor, params.projectId, body),
  )
  serve(router, jobs.listJobs, ({ actor, params }) => listJobs(database, actor, params.projectId))
  serve(router, jobs.startRecheck, ({ actor, params }) => startRecheck(database, actor, params.projectId))
  serve(router, jobs.readJob, ({ actor, params }) => readJob(database, actor, params.projectId, params.jobId))
  serve(router, jobs.cancelJob, ({ actor, params }) => cancelJob(database, actor, params.projectId, params.jobId))
  return router
}
