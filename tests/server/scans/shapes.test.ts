import { readFileSync } from 'node:fs'
import { afterAll, beforeAll, expect, test } from 'vitest'
import type { Device } from '../../../shared/contract/devices.js'
import type { Matching } from '../../../shared/contract/matching.js'
import type { FileReading, ReadingMapping } from '../../../shared/contract/scans.js'
import { startApplication, type Application } from '../../support/application.js'
import { laboratory } from './stack.js'

/** Each example file holds the same two curves in another shape: whichever is uploaded, the currents are the same. */
interface ShapeTruth {
  file: string
  shape: string
  jscMaCm2: [number, number]
  toleranceMaCm2: number
}
const files = new URL('../../../examples/files/', import.meta.url)
const truths = (JSON.parse(readFileSync(new URL('truth.json', files), 'utf8')) as { shapes: ShapeTruth[] }).shapes

let application: Application
let lab: ReturnType<typeof laboratory>
beforeAll(async () => {
  application = await startApplication()
  lab = laboratory(application, (await application.addProject('Shapes')).id)
})
afterAll(() => application?.stop())

test.each(truths.map((truth) => [truth.shape, truth] as const))('%s', async (_, truth) => {
  const device = await lab.tandem(truth.shape)
  const reading = await lab.upload(readFileSync(new URL(truth.file, files)), truth.file.split('/').at(-1)!)
  expect(reading.problem).toBeNull()
  await confirmBoth(reading, device)
  const reply = await application.as('lead').get(`${lab.base}/devices/${device.id}/matching`).expect(200)
  const { junctions, limitingJunction } = reply.body as Matching
  junctions.forEach((junction, i) =>
    expect(Math.abs(junction.jscMaCm2! - truth.jscMaCm2[i]!)).toBeLessThan(truth.toleranceMaCm2),
  )
  expect(limitingJunction).toBe(2)
})

/** The first two EQE columns, from one table or, where each junction has a table of its own, from two. */
async function confirmBoth(reading: FileReading, device: Device): Promise<void> {
  const proposed = onlyEqe(reading.mapping!, 2)
  const mappings = proposed.series.length === 2 ? [proposed] : reading.tables.slice(0, 2).map(mappingOf)
  let junction = 0
  for (const mapping of mappings) {
    const scans = mapping.series.map(({ column, quantity }) => ({
      column,
      quantity,
      deviceId: device.id,
      junctionId: device.junctions[junction++]!.id,
      conditions: {},
    }))
    await application
      .as('experimentalist')
      .post(`${lab.base}/source-files/${reading.file.id}/scans`)
      .send({ mapping, scans })
      .expect(201)
  }
  expect(junction).toBe(2)
}

function onlyEqe(mapping: ReadingMapping, atMost: number): ReadingMapping {
  return { ...mapping, series: mapping.series.filter((series) => series.quantity === 'eqe').slice(0, atMost) }
}

/** What a person would choose in a table, from what the reader says of its columns. */
function mappingOf({ sheet, tableIndex, columns }: FileReading['tables'][number]): ReadingMapping {
  const column = (role: string) => columns.find((one) => one.role === role)!
  return {
    sheet,
    tableIndex,
    wavelength: { column: column('wavelength').index, unit: 'nm' },
    series: [{ column: column('eqe').index, quantity: 'eqe', unit: unitOf(column('eqe').unit), label: '' }],
  }
}

function unitOf(unit: string | null) {
  return unit === 'percent' || unit === '%' ? ('percent' as const) : ('fraction' as const)
}
