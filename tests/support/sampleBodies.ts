import { v7 as uuid } from 'uuid'

const mapping = {
  sheet: null,
  tableIndex: 0,
  wavelength: { column: 0, unit: 'nm' },
  series: [{ column: 1, quantity: 'eqe', unit: 'fraction', label: 'top' }],
}
const device = { name: 'T-1', terminals: '2-terminal', junctions: [{ label: 'top' }, { label: 'bottom' }] }
const password = 'a password that is long enough'

/** A body that every route with a body takes, by the route's id; what it names does not exist. */
export const SAMPLE_BODIES: Record<string, unknown> = {
  signIn: { email: 'nobody@lab.example', password: 'no such password' },
  createFirstAdministrator: { name: 'First', email: 'first@lab.example', password },
  updateAccount: { name: 'Another name' },
  changePassword: { currentPassword: 'not the current one', newPassword: password },
  requestPasswordReset: { email: 'nobody@lab.example' },
  resetPassword: { newPassword: password },
  createProject: { name: 'A project' },
  updateProject: { version: 1, description: 'changed' },
  updateMember: { roles: ['designer'] },
  createInvitation: { email: 'guest@lab.example', roles: ['collaborator'] },
  acceptInvitation: { name: 'Guest', password },
  createDevice: device,
  updateDevice: { ...device, version: 1 },
  previewMapping: { mapping },
  confirmReading: {
    mapping,
    scans: [{ column: 1, quantity: 'eqe', deviceId: uuid(), junctionId: uuid(), conditions: {} }],
  },
  updateConditions: { version: 1, label: '', conditions: {} },
  decideScan: { version: 1, state: 'accepted' },
  answerFinding: { kind: 'accepted', reason: 'Known and harmless here.' },
  updateThresholds: { version: 0, settings: {} },
  createSpectrum: { sourceFileId: uuid(), name: 'Lamp', mapping },
  createAccount: { name: 'New person', email: 'new.person@lab.example' },
  updateAccountByAdministrator: { disabled: false },
}
