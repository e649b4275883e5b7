import { Router } from 'express'
import * as routes from '../../shared/contract/scans.js'
import type { MakeRouter } from '../app.js'
import { limitAttempts } from '../middleware/rateLimits.js'
import { receiveFiles } from '../middleware/uploads.js'
import { confirmReading } from '../services/scans/confirmReading.js'
import { deleteSourceFile } from '../services/scans/deleteSourceFile.js'
import { downloadSourceFile } from '../services/scans/downloadSourceFile.js'
import { listSourceFiles } from '../services/scans/listSourceFiles.js'
import { previewMapping } from '../services/scans/previewMapping.js'
import { readSourceFile } from '../services/scans/readSourceFile.js'
import { uploadFiles } from '../services/scans/uploadFiles.js'
import { serve } from './serve.js'

export const sourceFilesRouter: MakeRouter = ({ database, config }) => {
  const router = Router()
  router.post(routes.uploadFiles.path, limitAttempts(config, 'upload'))

  serve(router, routes.uploadFiles, ({ actor, params, request, response }) =>
    uploadFiles(database, actor, params.projectId, 'edit-scans', () => receiveFiles(request, response, config)),
  )
  serve(router, routes.listSourceFiles, ({ actor, params, query }) =>
    listSourceFiles(database, actor, params.projectId, query),
  )
  serve(router, routes.readSourceFile, ({ actor, params }) =>
    readSourceFile(database, actor, params.projectId, params.sourceFileId),
  )
  serve(router, routes.previewMapping, ({ actor, params, body }) =>
    previewMapping(database, actor, params.projectId, params.sourceFileId, body.mapping),
  )
  serve(router, routes.confirmReading, ({ actor, params, body }) =>
    confirmReading(database, actor, params.projectId, params.sourceFileId, body),
  )
  serve(router, routes.deleteSourceFile, ({ actor, params }) =>
    deleteSourceFile(database, actor, params.projectId, params.sourceFileId),
  )
  serve(router, routes.downloadSourceFile, async ({ actor, params, response }) => {
    const { name, bytes } = await downloadSourceFile(database, actor, params.projectId, params.sourceFileId)
    response.attachment(name).type('application/octet-stream').send(bytes)
    return null
  })
  return router
}
