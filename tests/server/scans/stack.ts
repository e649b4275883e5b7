import type { Device } from '../../../shared/contract/devices.js'
import type { FileReading, Scan } from '../../../shared/contract/scans.js'
import { makeCurve, type Curve } from '../../../shared/physics/curve.js'
import type { Application, CallerName } from '../../support/application.js'

/** A made-up tandem whose two curves have closed forms, so that every test knows the truth. */
const GRID = Array.from({ length: 91 }, (_, i) => 300 + 10 * i)
const edge = (nm: number, at: number, width: number) => 1 / (1 + Math.exp((nm - at) / width))
const round = (value: number) => Math.round(value * 1e5) / 1e5
const curveOf = (value: (nm: number) => number) =>
  makeCurve(
    GRID,
    GRID.map((nm) => round(value(nm))),
  )

export const TOP = curveOf((nm) => 0.8 * edge(nm, 740, 8) * (1 - edge(nm, 330, 5)))
export const BOTTOM = curveOf((nm) => 0.9 * (1 - edge(nm, 740, 8)) * edge(nm, 1080, 15))
export const REFLECTANCE = curveOf((nm) => 0.05 + 0.02 * Math.cos(nm / 60))

export function csvOf(columns: Record<string, Curve>): Buffer {
  const curves = Object.values(columns)
  const rows = GRID.map((nm, i) => [nm, ...curves.map((curve) => curve.values[i]!)].join(','))
  return Buffer.from([['Wavelength (nm)', ...Object.keys(columns)].join(','), ...rows, ''].join('\n'))
}

export const BOTH = () => csvOf({ 'EQE top': TOP, 'EQE bottom': BOTTOM })

/** Use cases through HTTP, each expected to succeed, for tests that are about what comes after. */
export function laboratory(application: Application, projectId: string) {
  const base = `/api/projects/${projectId}`
  return {
    base,
    async tandem(name: string, terminals = '2-terminal'): Promise<Device> {
      const body = { name, terminals, junctions: [{ label: 'top' }, { label: 'bottom' }] }
      return (await application.as('lead').post(`${base}/devices`).send(body).expect(201)).body as Device
    },
    async upload(bytes: Buffer, name: string, who: CallerName = 'experimentalist'): Promise<FileReading> {
      const reply = await application.as(who).post(`${base}/source-files`).attach('files', bytes, name).expect(201)
      return reply.body.items[0] as FileReading
    },
    /** Confirms the proposed mapping, its EQE columns in order for the junctions from `first` on. */
    async confirm(reading: FileReading, device: Device, first = 0): Promise<Scan[]> {
      const reply = await application
        .as('experimentalist')
        .post(`${base}/source-files/${reading.file.id}/scans`)
        .send(confirmation(reading, device, first))
        .expect(201)
      return reply.body.items as Scan[]
    },
  }
}

export function confirmation(reading: FileReading, device: Device, first = 0) {
  let next = first
  return {
    mapping: reading.mapping!,
    scans: reading.mapping!.series.map(({ column, quantity }) => ({
      column,
      quantity,
      deviceId: device.id,
      junctionId: quantity === 'eqe' ? device.junctions[next++]!.id : null,
      conditions: {},
    })),
  }
}
