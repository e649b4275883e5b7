import { Router } from 'express'
import * as routes from '../../shared/contract/spectra.js'
import type { MakeRouter } from '../app.js'
import { limitAttempts } from '../middleware/rateLimits.js'
import { receiveFiles } from '../middleware/uploads.js'
import { uploadFiles } from '../services/scans/uploadFiles.js'
import { createSpectrum } from '../services/spectra/createSpectrum.js'
import { deleteSpectrum } from '../services/spectra/deleteSpectrum.js'
import { listSpectra } from '../services/spectra/listSpectra.js'
import { readSpectrum } from '../services/spectra/readSpectrum.js'
import { serve } from './serve.js'

export const spectraRouter: MakeRouter = ({ database, config }) => {
  const router = Router()
  router.post(routes.uploadSpectrumFiles.path, limitAttempts(config, 'upload'))

  serve(router, routes.listSpectra, ({ actor, params }) => listSpectra(database, actor, params.projectId))
  serve(router, routes.readSpectrum, ({ actor, params }) =>
    readSpectrum(database, actor, params.projectId, params.spectrumId),
  )
  serve(router, routes.createSpectrum, ({ actor, params, body }) =>
    createSpectrum(database, actor, params.projectId, body),
  )
  serve(router, routes.uploadSpectrumFiles, ({ actor, params, request, response }) =>
    uploadFiles(database, actor, params.projectId, 'edit-library', () => receiveFiles(request, response, config)),
  )
  serve(router, routes.deleteSpectrum, ({ actor, params }) =>
    deleteSpectrum(database, actor, params.projectId, params.spectrumId),
  )
  return router
}
