import { Router } from 'express'
import * as routes from '../../shared/contract/bench.js'
import type { MakeRouter } from '../app.js'
import { createBenchItem, deleteBenchItem, listBenchItems, updateBenchItem } from '../services/bench/benchItems.js'
import { detectorContent } from '../services/bench/detectorContent.js'
import { lightSourceContent } from '../services/bench/lightSourceContent.js'
import { setUpContent } from '../services/bench/setUpContent.js'
import { serve } from './serve.js'

export const benchRouter: MakeRouter = ({ database }) => {
  const router = Router()
  const { work } = database

  serve(router, routes.listSetUps, ({ actor, params }) => listBenchItems(database, actor, params.projectId, 'set-up'))
  serve(router, routes.createSetUp, ({ actor, params: { projectId }, body }) =>
    createBenchItem(database, actor, projectId, 'set-up', body.name, () => setUpContent(work, projectId, body.content)),
  )
  serve(router, routes.updateSetUp, ({ actor, params: { projectId, itemId }, body }) =>
    updateBenchItem(database, actor, projectId, 'set-up', itemId, body, () =>
      setUpContent(work, projectId, body.content),
    ),
  )
  serve(router, routes.deleteSetUp, ({ actor, params }) =>
    deleteBenchItem(database, actor, params.projectId, 'set-up', params.itemId),
  )

  serve(router, routes.listLightSources, ({ actor, params }) =>
    listBenchItems(database, actor, params.projectId, 'light-source'),
  )
  serve(router, routes.createLightSource, ({ actor, params: { projectId }, body }) =>
    createBenchItem(database, actor, projectId, 'light-source', body.name, () =>
      lightSourceContent(work, projectId, body.content),
    ),
  )
  serve(router, routes.updateLightSource, ({ actor, params: { projectId, itemId }, body }) =>
    updateBenchItem(database, actor, projectId, 'light-source', itemId, body, () =>
      lightSourceContent(work, projectId, body.content),
    ),
  )
  serve(router, routes.deleteLightSource, ({ actor, params }) =>
    deleteBenchItem(database, actor, params.projectId, 'light-source', params.itemId),
  )

  serve(router, routes.listDetectors, ({ actor, params }) =>
    listBenchItems(database, actor, params.projectId, 'detector'),
  )
  serve(router, routes.createDetector, ({ actor, params: { projectId }, body }) =>
    createBenchItem(database, actor, projectId, 'detector', body.name, () =>
      detectorContent(work, projectId, body.content),
    ),
  )
  serve(router, routes.updateDetector, ({ actor, params: { projectId, itemId }, body }) =>
    updateBenchItem(database, actor, projectId, 'detector', itemId, body, () =>
      detectorContent(work, projectId, body.content),
    ),
  )
  serve(router, routes.deleteDetector, ({ actor, params }) =>
    deleteBenchItem(database, actor, params.projectId, 'detector', params.itemId),
  )
  return router
}
