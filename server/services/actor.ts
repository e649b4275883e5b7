import { ApiError } from '../../shared/contract/errors.js'

/** Who acts: a person in a browser session now, an access token that stands for a person later. */
export interface Actor {
  personId: string
  name: string
  email: string
  isAdministrator: boolean
}

export function requireAdministrator(actor: Actor): void {
  if (!actor.isAdministrator)
    throw new ApiError('RIGHT_MISSING', { right: 'administrator' }, 'Only an administrator of the site may do this.')
}
