import { v7 as uuid } from 'uuid'
import { addUser } from '../database/repositories/users.js'
import type { Work } from '../database/transaction.js'
import type { Actor } from '../services/actor.js'
import { hashPassword } from '../services/passwords.js'
import { DEMONSTRATION_PASSWORD, DEMONSTRATION_PEOPLE, type DemonstrationPerson } from './signIns.js'

/** The sign-ins as the sign-in page and the start script show them. */
export function demonstrationPeople() {
  return DEMONSTRATION_PEOPLE.map(({ name, email, description }) => ({
    name,
    email,
    role: description,
    password: DEMONSTRATION_PASSWORD,
  }))
}

/** Adds the people and gives them as actors by key. */
export async function addDemonstrationPeople(work: Work): Promise<Record<DemonstrationPerson['key'], Actor>> {
  const passwordHash = await hashPassword(DEMONSTRATION_PASSWORD)
  const actors: Partial<Record<DemonstrationPerson['key'], Actor>> = {}
  for (const { key, name, email, role } of DEMONSTRATION_PEOPLE) {
    const id = uuid()
    const isAdministrator = role === null
    await addUser(work, {
      id,
      name,
      email,
      passwordHash,
      isAdministrator,
      disabled: false,
      createdAt: new Date(),
      lastSignInAt: null,
    })
    actors[key] = { personId: id, name, email, isAdministrator }
  }
  return actors as Record<DemonstrationPerson['key'], Actor>
}
