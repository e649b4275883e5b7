import type { Role } from '../../shared/contract/rights.js'

/** Invented people of an invented group, the Fennmoor thin-film laboratory: one a role, and an administrator. */
export const DEMONSTRATION_PASSWORD = 'shortest-bar-limits'

export interface DemonstrationPerson {
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
