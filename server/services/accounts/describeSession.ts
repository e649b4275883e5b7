import type { Person, Session } from '../../../shared/contract/account.js'
import { numberOfUsers } from '../../database/repositories/users.js'
import { demonstrationPeople } from '../../demonstration/people.js'
import type { Actor } from '../actor.js'
import type { Context } from '../context.js'

/** What the client has to know before anything else. */
export async function describeSession(
  { database, config }: Context,
  actor: Actor | null,
  csrfToken: string,
): Promise<Session> {
  return {
    person: actor && presentPerson(actor),
    csrfToken,
    installation: {
      needsFirstAdministrator: actor === null && (await numberOfUsers(database.work)) === 0,
      demonstrationPeople: config.demonstration ? demonstrationPeople() : [],
      mailDelivery: config.smtpUrl ? 'smtp' : 'outbox',
    },
  }
}

export function presentPerson(actor: Actor): Person {
  return { id: actor.personId, name: actor.name, email: actor.email, isAdministrator: actor.isAdministrator }
}
