import type { FieldError } from '../../../shared/contract/errors.js'
import type { BodyOf } from '../../../shared/contract/route.js'
import type { confirmReading as route } from '../../../shared/contract/scans.js'
import type { DeviceWithStack } from '../../database/repositories/devices.js'

type Confirmation = BodyOf<typeof route>
type ConfirmedScan = Confirmation['scans'][number]

/** A scan that was made of the file before. */
interface EarlierScan {
  sourceColumn: number
  junctionId: string | null
  deviceId: string
  mapping: Confirmation['mapping']
}

/** What keeps a confirmation from becoming scans: each error with the place in the request that it blames. */
export function confirmationErrors(
  { mapping, scans }: Confirmation,
  devices: readonly DeviceWithStack[],
  earlier: readonly EarlierScan[],
): FieldError[] {
  const given = new Set<number>()
  return scans.flatMap((scan, i) => {
    const problem =
      columnProblem(scan, mapping, given) ?? targetProblem(scan, devices) ?? repetition(scan, mapping, earlier)
    given.add(scan.column)
    return problem ? [{ path: ['scans', i, problem.field], message: problem.message }] : []
  })
}

interface Problem {
  field: keyof ConfirmedScan
  message: string
}

function columnProblem(
  { column, quantity }: ConfirmedScan,
  { series }: Confirmation['mapping'],
  given: ReadonlySet<number>,
): Problem | null {
  const mapped = series.find((one) => one.column === column)
  if (!mapped) return { field: 'column', message: `Column ${column + 1} is not one that the mapping reads.` }
  if (given.has(column)) return { field: 'column', message: `Column ${column + 1} is given twice.` }
  if (mapped.quantity !== quantity)
    return {
      field: 'quantity',
      message: `The mapping reads column ${column + 1} as ${mapped.quantity}, so it cannot become a scan of ${quantity}.`,
    }
  return null
}

function targetProblem(
  { column, quantity, deviceId, junctionId }: ConfirmedScan,
  devices: readonly DeviceWithStack[],
): Problem | null {
  const device = devices.find((one) => one.id === deviceId)
  if (!device)
    return { field: 'deviceId', message: `The device of column ${column + 1} is not a device of this project.` }
  if (quantity === 'reflectance')
    return junctionId === null
      ? null
      : {
          field: 'junctionId',
          message: `Column ${column + 1} is a reflectance: it belongs to the device, not to a junction.`,
        }
  if (junctionId === null)
    return { field: 'junctionId', message: `Say which junction of ${device.name} column ${column + 1} belongs to.` }
  if (device.junctions.some((junction) => junction.id === junctionId)) return null
  return { field: 'junctionId', message: `The junction of column ${column + 1} is not a junction of ${device.name}.` }
}

function repetition(
  { column, deviceId, junctionId }: ConfirmedScan,
  { tableIndex, sheet }: Confirmation['mapping'],
  earlier: readonly EarlierScan[],
): Problem | null {
  const isThere = earlier.some(
    (scan) =>
      scan.sourceColumn === column &&
      scan.deviceId === deviceId &&
      scan.junctionId === junctionId &&
      scan.mapping.tableIndex === tableIndex &&
      scan.mapping.sheet === sheet,
  )
  return isThere ? { field: 'column', message: `Column ${column + 1} is a scan of this junction already.` } : null
}
