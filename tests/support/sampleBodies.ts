import { v7 as uuid } from 'uuid'

const mapping = {
  sheet: null,
  tableIndex: 0,
  wavelength: { column: 0, unit: 'nm' },
  series: [{ column: 1, quantity: 'eqe', unit: 'fraction', label: 'top' }],
}
const device = { name: 'T-1', terminals: '2-terminal', junctions: [{ label: 'top' }, { label: 'bottom' }] }
const pass = { sourceFileId: uuid(), wavelength: { column: 0 }, signal: { magnitude: 1 }, gain: { shuntOhm: 50 } }
const reduction = { device: pass, reference: pass, detectorId: uuid() }
const led = { kind: 'led', centreNm: 940, fwhmNm: 50, highestIrradianceWM2: 200 }
const series = { name: 'Series', varied: 'irradiance', scanIds: [uuid(), uuid()] }
const opticalJunction = { thicknessNm: 500, absorber: { material: 'si-green-2008' } }
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
  createBiasSeries: series,
  updateBiasSeries: { ...series, version: 1 },
  previewRaw: { reduction },
  createRawScan: { reduction, deviceId: uuid(), junctionId: uuid(), conditions: {} },
  updateRawScan: { version: 1, reduction },
  acceptUnmixing: { junctionId: uuid(), parentScanIds: [uuid(), uuid()] },
  planBias: { junctionId: uuid() },
  createSetUp: { name: 'Bench 1', content: {} },
  updateSetUp: { version: 1, name: 'Bench 1', content: {} },
  createLightSource: { name: 'LED 940 nm', content: led },
  updateLightSource: { version: 1, name: 'LED 940 nm', content: led },
  createDetector: { name: 'Photodiode', content: { sourceFileId: uuid(), mapping } },
  updateDetector: { version: 1, name: 'Photodiode', content: { sourceFileId: uuid(), mapping } },
  createSpectrum: { sourceFileId: uuid(), name: 'Lamp', mapping },
  saveWhatIfModel: { version: 0, description: { junctions: [opticalJunction, opticalJunction] } },
  createScenario: { name: 'Thicker', reason: 'The top cell limits.', change: { '1.thicknessNm': 560 } },
  updateScenario: { version: 1, name: 'Thicker', reason: 'The top cell limits.' },
  createAccount: { name: 'New person', email: 'new.person@lab.example' },
  updateAccountByAdministrator: { disabled: false },
}
