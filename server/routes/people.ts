import { Router } from 'express'
import * as routes from '../../shared/contract/projects.js'
import type { MakeRouter } from '../app.js'
import { limitAttempts } from '../middleware/rateLimits.js'
import { acceptInvitation, readInvitation } from '../services/people/acceptInvitation.js'
import { createInvitation, listInvitations, withdrawInvitation } from '../services/people/invite.js'
import { listMembers, removeMember, updateMember } from '../services/people/members.js'
import { serve } from './serve.js'

export const peopleRouter: MakeRouter = (parts) => {
  const { database, config } = parts
  const router = Router()
  router.post(routes.createInvitation.path, limitAttempts(config, 'invitation'))
  router.post(routes.acceptInvitation.path, limitAttempts(config, 'sign-in'))

  serve(router, routes.listMembers, ({ actor, params, query }) => listMembers(database, actor, params.projectId, query))
  serve(router, routes.updateMember, ({ actor, params, body }) =>
    updateMember(database, actor, params.projectId, params.personId, body.roles),
  )
  serve(router, routes.removeMember, async ({ actor, params }) => {
    await removeMember(database, actor, params.projectId, params.personId)
    return null
  })
  serve(router, routes.listInvitations, ({ actor, params, query }) =>
    listInvitations(database, actor, params.projectId, query),
  )
  serve(router, routes.createInvitation, ({ actor, params, body }) =>
    createInvitation(parts, actor, params.projectId, body),
  )
  serve(router, routes.withdrawInvitation, ({ actor, params }) =>
    withdrawInvitation(database, actor, params.projectId, params.invitationId),
  )
  serve(router, routes.readInvitation, ({ params }) => readInvitation(database, params.token))
  serve(router, routes.acceptInvitation, async ({ params, body }) => {
    const { projectId } = await acceptInvitation(database, params.token, body)
    return { projectId }
  })
  return router
}
