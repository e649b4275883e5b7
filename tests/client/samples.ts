import type { Session } from '../../shared/contract/account.js'
import type { Device } from '../../shared/contract/devices.js'
import type { DeviceSummary, Matching } from '../../shared/contract/matching.js'
import type { Project } from '../../shared/contract/projects.js'
import type { Scan } from '../../shared/contract/scans.js'
import type { Spectrum } from '../../shared/contract/spectra.js'

/** Things as the server sends them; each test changes what it is about. */
export const idOf = (n: number) => `0190a000-0000-7000-8000-${String(n).padStart(12, '0')}`
const AT = '2026-05-04T08:30:00.000Z'

export const person = { id: idOf(1), name: 'Ines Okafor', email: 'ines@heliolab.example', isAdministrator: false }

export const session = (change: Partial<Session> = {}): Session => ({
  person,
  csrfToken: 'first-token',
  installation: { needsFirstAdministrator: false, demonstrationPeople: [], mailDelivery: 'outbox' },
  ...change,
})

export const project = (change: Partial<Project> = {}): Project => ({
  id: idOf(100),
  name: 'Perovskite on silicon',
  description: '',
  archived: false,
  deletedAt: null,
  version: 1,
  createdAt: AT,
  myRoles: ['lead', 'designer', 'experimentalist'],
  deviceCount: 2,
  scanCount: 4,
  lastScanAt: AT,
  memberCount: 3,
  ...change,
})

export const device = (change: Partial<Device> = {}): Device => ({
  id: idOf(200),
  projectId: idOf(100),
  name: 'T-01',
  sampleId: 'S-17',
  description: '',
  series: 'thickness',
  apertureAreaCm2: null,
  deviceAreaCm2: 1,
  terminals: '2-terminal',
  junctions: [
    { id: idOf(301), position: 1, label: 'top', absorber: 'perovskite', nominalGapEv: 1.68, thicknessNm: 450 },
    { id: idOf(302), position: 2, label: 'bottom', absorber: 'silicon', nominalGapEv: 1.12, thicknessNm: 180_000 },
  ],
  layers: [],
  version: 3,
  createdAt: AT,
  updatedAt: AT,
  deletedAt: null,
  ...change,
})

export const matching = (of: Device, [top, bottom]: readonly [number | null, number | null]): Matching => {
  const complete = top !== null && bottom !== null
  const limiting = !complete ? [] : top === bottom ? [1, 2] : top < bottom ? [1] : [2]
  const low = complete ? Math.min(top, bottom) : null
  const high = complete ? Math.max(top, bottom) : null
  return {
    deviceId: of.id,
    spectrum: { id: 'AM1.5G', name: 'AM1.5G', totalIrradianceWM2: 1000.37, scaledToWM2: null, scaleFactor: 1 },
    wiring: 'series',
    complete,
    missing: complete ? [] : ['A scan of one junction is missing.'],
    junctions: of.junctions.map((junction, i) => ({
      junctionId: junction.id,
      position: junction.position,
      label: junction.label,
      scanId: null,
      scanState: null,
      jscMaCm2: [top, bottom][i] ?? null,
      excessMaCm2: null,
      excessPercent: null,
      rangeNm: null,
      points: null,
      coverage: null,
      edgeResponse: null,
      gap: null,
    })),
    limitingJunction: limiting.length === 1 ? limiting[0]! : null,
    limitingJunctions: limiting,
    jLimMaCm2: low,
    jMatchedMaCm2: low === null || high === null ? null : (low + high) / 2,
    gainOpenMaCm2: low === null || high === null ? null : (high - low) / 2,
    mismatchPercent: low === null || high === null ? null : (100 * (high - low)) / low,
    pairs: [],
    findings: [],
    worstFinding: null,
  }
}

export const summary = (
  change: Partial<Device>,
  currents: readonly [number | null, number | null],
  rest: { worstFinding?: Matching['worstFinding']; scanCount?: number; lastScanAt?: string | null } = {},
): DeviceSummary => {
  const of = device(change)
  return {
    device: of,
    matching: { ...matching(of, currents), worstFinding: rest.worstFinding ?? null },
    scanCount: rest.scanCount ?? 2,
    lastScanAt: rest.lastScanAt === undefined ? AT : rest.lastScanAt,
  }
}

export const am15g: Spectrum = {
  id: 'AM1.5G',
  kind: 'reference',
  name: 'AM1.5G',
  source: 'ASTM G173-03',
  rangeNm: [280, 4000],
  points: 2002,
  totalIrradianceWM2: 1000.37,
  uploadedBy: null,
  uploadedAt: null,
}

export const scan = (change: Partial<Scan> = {}): Scan => ({
  id: idOf(400),
  projectId: idOf(100),
  deviceId: idOf(200),
  junctionId: idOf(302),
  quantity: 'eqe',
  label: 'bottom, 4 May',
  points: 181,
  rangeNm: [300, 1200],
  conditions: {
    biasLight: [],
    biasVoltageV: null,
    temperatureC: null,
    chopperHz: null,
    spotAreaCm2: null,
    deviceAreaCm2: null,
    illumination: null,
    referenceDetector: '',
    referenceCalibrationDate: null,
    operator: '',
    instrument: '',
    measuredOn: null,
    filterChangesNm: [],
    jvJscMaCm2: null,
    note: '',
  },
  state: 'checked',
  decision: null,
  inUse: true,
  worstFinding: 'caution',
  unansweredRejects: 0,
  origin: 'eqe-file',
  parentScanIds: [],
  biasSeriesId: null,
  sourceFile: { id: idOf(500), name: 'bottom.csv', sha256: 'a'.repeat(64) },
  mapping: {
    sheet: null,
    tableIndex: 0,
    wavelength: { column: 0, unit: 'nm' },
    series: [{ column: 1, quantity: 'eqe', unit: 'percent', label: 'EQE' }],
  },
  uploadedAt: AT,
  uploadedBy: { id: idOf(1), name: 'Ines Okafor' },
  version: 1,
  deletedAt: null,
  ...change,
})

export const page = <Item>(items: Item[]) => ({ items, total: items.length, nextCursor: null })
