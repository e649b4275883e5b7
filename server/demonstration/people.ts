import { v7 as uuid } from 'uuid'
import type { Role } from '../../shared/contract/rights.js'
import { addUser } from '../database/repositories/users.js'
import type { Work } from '../database/transaction.js'
import type { Actor } from '../services/actor.js'
import { hashPassword } from '../services/passwords.js'

/** Invented people of an invented group, the Fennmoor thin-film laboratory: one a role, and an administrator. */
export const DEMONSTRATION_PASSWORD = 'shortest-bar-limits'

interface DemonstrationPerson {
  key: 'lead' | 'designer' | 'experimentalist' | 'collaborator' | 'administrator'
  name: string
  email: string
  role: Role | null
  description: string
}

export const DEMONSTRATION_PEOPLE: readonly DemonstrationPerson[] = [
  {
    key: 'experimentalist',
    name: 'Ilva Torrin',
    email: 'ilva@fennmoor.example',
    role: 'experimentalist',
    description: 'experimentalist: uploads and judges scans',
  },
  {
    key: 'designer',
    name: 'Oskar Velde',
    email: 'oskar@fennmoor.example',
    role: 'designer',
    description: 'device designer: compares currents, plans changes',
  },
  {
    key: 'lead',
    name: 'Maren Quist',
    email: 'maren@fennmoor.example',
    role: 'lead',
    description: 'group leader: reviews and approves',
  },
  {
    key: 'collaborator',
    name: 'Tevin Hale',
    email: 'tevin@partnerlab.example',
    role: 'collaborator',
    description: 'collaborator of a partner laboratory: reads and comments',
  },
  {
    key: 'administrator',
    name: 'Rikke Sand',
    email: 'admin@fennmoor.example',
    role: null,
    description: 'administrator of the site: accounts, mail, audit trail',
  },
]

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
