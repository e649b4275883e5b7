import { Router } from 'express'
import * as routes from '../../shared/contract/projects.js'
import type { MakeRouter } from '../app.js'
import { createProject } from '../services/projects/createProject.js'
import { listActivity } from '../services/projects/listActivity.js'
import { listProjects } from '../services/projects/listProjects.js'
import { readProject } from '../services/projects/readProject.js'
import { deleteProject, restoreProject, updateProject } from '../services/projects/updateProject.js'
import { serve } from './serve.js'

export const projectsRouter: MakeRouter = ({ database }) => {
  const router = Router()
  serve(router, routes.listProjects, ({ actor, query }) => listProjects(database, actor, query))
  serve(router, routes.createProject, ({ actor, body }) => createProject(database, actor, body))
  serve(router, routes.readProject, ({ actor, params }) => readProject(database, actor, params.projectId))
  serve(router, routes.updateProject, ({ actor, params, body }) =>
    updateProject(database, actor, params.projectId, body),
  )
  serve(router, routes.deleteProject, ({ actor, params }) => deleteProject(database, actor, params.projectId))
  serve(router, routes.restoreProject, ({ actor, params }) => restoreProject(database, actor, params.projectId))
  serve(router, routes.listActivity, ({ actor, params, query }) =>
    listActivity(database, actor, params.projectId, query),
  )
  return router
}
