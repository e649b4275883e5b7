import { utils, write } from 'xlsx'
import type { Scenario as ScenarioReply, ScenarioResult } from '../../../shared/contract/scenarios.js'
import type { Database } from '../../database/transaction.js'
import type { Actor } from '../actor.js'
import { findDevice } from '../devices/findDevice.js'
import { listScenarios } from './listScenarios.js'

type Cell = string | number | null

/** One row a scenario, measured and changed side by side; numbers as numbers, units in the headers. */
export async function exportScenarios(
  database: Database,
  actor: Actor,
  projectId: string,
  deviceId: string,
  format: 'xlsx' | 'csv',
): Promise<{ name: string; bytes: Buffer }> {
  const { items } = await listScenarios(database, actor, projectId, deviceId)
  const device = await findDevice(database.work, projectId, deviceId)
  const sheet = utils.aoa_to_sheet(comparison(device.junctions.length, items))
  const name = `${device.name} scenarios.${format}`
  if (format === 'csv') return { name, bytes: Buffer.from(`\uFEFF${utils.sheet_to_csv(sheet)}\n`, 'utf8') }
  const book = utils.book_new()
  utils.book_append_sheet(book, sheet, 'Scenarios')
  return { name, bytes: write(book, { type: 'buffer', bookType: 'xlsx' }) as Buffer }
}

function comparison(junctions: number, scenarios: readonly ScenarioReply[]): Cell[][] {
  const figures = [
    ...Array.from({ length: junctions }, (_, i) => `J${i + 1} (mA/cm²)`),
    'J_lim (mA/cm²)',
    'mismatch (%)',
    'gain still open (mA/cm²)',
    'V_oc estimate (V)',
    'FF estimate (%)',
    'efficiency estimate (%)',
  ]
  const header = [
    'scenario',
    'reason',
    'change (nm, eV)',
    'optical model',
    'spectrum',
    ...figures.map((one) => `measured ${one}`),
    ...figures.map((one) => `changed ${one}`),
    'changed since',
    'made by',
    'made at (UTC)',
    'engine',
  ]
  return [header, ...scenarios.map(rowOf)]
}

function rowOf({ result, ...scenario }: ScenarioReply): Cell[] {
  return [
    asText(scenario.name),
    asText(scenario.reason),
    Object.entries(scenario.change)
      .map(([key, value]) => `${key} = ${value}`)
      .join('; '),
    scenario.model,
    asText(scenario.spectrum.name),
    ...cells(result.measured),
    ...cells(result.changed),
    scenario.stale.changed.join(' '),
    asText(scenario.madeBy.name),
    scenario.madeAt,
    scenario.inputs.engineVersion,
  ]
}

function cells({
  currentsMaCm2,
  jLimMaCm2,
  mismatchPercent,
  gainOpenMaCm2,
  power,
}: ScenarioResult['measured']): Cell[] {
  return [
    ...currentsMaCm2,
    jLimMaCm2,
    mismatchPercent,
    gainOpenMaCm2,
    power && power.openCircuitV,
    power && 100 * power.fillFactor,
    power && 100 * power.efficiency,
  ]
}

/** A text that a spreadsheet would run as a formula is kept a text. */
function asText(text: string): string {
  return /^[=+\-@]/.test(text) ? `'${text}` : text
}
