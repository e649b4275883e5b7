import { In, IsNull, MoreThan } from 'typeorm'
import type { Work } from '../transaction.js'
import type { NamePosition, TimePosition } from './position.js'
import { Device } from '../entities/Device.js'
import { Junction } from '../entities/Junction.js'
import { Layer } from '../entities/Layer.js'

export type JunctionRow = Omit<Junction, 'device'>
export type LayerRow = Omit<Layer, 'device'>
/** A device with its junctions and layers in order. */
export type DeviceWithStack = Omit<Device, 'project' | 'junctions' | 'layers'> & {
  junctions: JunctionRow[]
  layers: LayerRow[]
}

export async function deviceOfProject(
  work: Work,
  projectId: string,
  deviceId: string,
): Promise<DeviceWithStack | null> {
  const device = await work.findOneBy(Device, { id: deviceId, projectId, deletedAt: IsNull() })
  return device && withStack(work, device)
}

export async function devicesById(work: Work, deviceIds: string[]): Promise<DeviceWithStack[]> {
  if (deviceIds.length === 0) return []
  return withStacks(work, await work.findBy(Device, { id: In(deviceIds), deletedAt: IsNull() }))
}

/** What a matching needs of a device: its wiring and its junctions, no layers. */
export async function deviceWithJunctions(
  work: Work,
  projectId: string,
  deviceId: string,
): Promise<Pick<DeviceWithStack, 'id' | 'terminals' | 'junctions'> | null> {
  const [device, junctions] = await Promise.all([
    work.findOne(Device, {
      select: { id: true, terminals: true },
      where: { id: deviceId, projectId, deletedAt: IsNull() },
    }),
    work.find(Junction, { where: { deviceId }, order: { position: 'ASC' } }),
  ])
  return device && { id: device.id, terminals: device.terminals, junctions }
}

export async function devicesOfProjectById(
  work: Work,
  projectId: string,
  deviceIds: string[],
): Promise<DeviceWithStack[]> {
  if (deviceIds.length === 0) return []
  return withStacks(work, await work.findBy(Device, { id: In(deviceIds), projectId, deletedAt: IsNull() }))
}

/** Locks the devices' rows, in the order of their ids, before anything is added to them. */
export async function lockDevices(work: Work, deviceIds: readonly string[]): Promise<void> {
  for (const id of [...deviceIds].sort())
    await work.findOne(Device, { select: { id: true }, where: { id }, lock: { mode: 'pessimistic_write' } })
}

/** The device and a lock on its row until the transaction ends; a deleted one too when `deletedSince` is given. */
export async function lockedDevice(
  work: Work,
  projectId: string,
  deviceId: string,
  deletedSince: Date | null = null,
): Promise<DeviceWithStack | null> {
  const device = await work.findOne(Device, {
    where: { id: deviceId, projectId, deletedAt: deletedSince ? MoreThan(deletedSince) : IsNull() },
    lock: { mode: 'pessimistic_write' },
  })
  return device && withStack(work, device)
}

/** By name; names may repeat, so the id decides. */
export async function devicesOfProject(
  work: Work,
  projectId: string,
  after: NamePosition | null,
  limit: number,
): Promise<{ devices: DeviceWithStack[]; total: number }> {
  const query = work
    .createQueryBuilder(Device, 'device')
    .where('device.projectId = :projectId AND device.deletedAt IS NULL', { projectId })
  const total = await query.clone().getCount()
  if (after) query.andWhere('(device.name > :name OR (device.name = :name AND device.id > :id))', after)
  const devices = await query.orderBy('device.name').addOrderBy('device.id').limit(limit).getMany()
  return { devices: await withStacks(work, devices), total }
}

/** Latest deletion first. */
export async function devicesDeletedSince(
  work: Work,
  projectId: string,
  since: Date,
  after: TimePosition | null,
  limit: number,
): Promise<{ devices: DeviceWithStack[]; total: number }> {
  const query = work
    .createQueryBuilder(Device, 'device')
    .where('device.projectId = :projectId AND device.deletedAt > :since', { projectId, since })
  const total = await query.clone().getCount()
  if (after) query.andWhere('(device.deletedAt < :at OR (device.deletedAt = :at AND device.id < :id))', after)
  const devices = await query.orderBy('device.deletedAt', 'DESC').addOrderBy('device.id', 'DESC').limit(limit).getMany()
  return { devices: await withStacks(work, devices), total }
}

export async function insertDevice(work: Work, device: DeviceWithStack): Promise<void> {
  await work.insert(Device, rowOf(device))
  await insertStack(work, device)
}

/** Writes the device and its stack; junctions that keep their id keep their scans, the others go. */
export async function updateDevice(work: Work, device: DeviceWithStack): Promise<void> {
  const { id, ...row } = rowOf(device)
  await work.update(Device, { id }, row)
  await work.delete(Layer, { deviceId: id })
  const known = await work.findBy(Junction, { deviceId: id })
  const kept = new Set(device.junctions.map((junction) => junction.id))
  const gone = known.filter((junction) => !kept.has(junction.id))
  if (gone.length > 0) await work.delete(Junction, { id: In(gone.map((junction) => junction.id)) })
  // Positions are unique in a device, so those that stay first make room for the new order.
  await work.query('UPDATE junction SET position = -position WHERE deviceId = ?', [id])
  const stayed = new Set(known.map((junction) => junction.id))
  for (const junction of device.junctions) {
    const values = junctionRow(junction, id)
    if (stayed.has(junction.id)) await work.update(Junction, { id: junction.id }, values)
    else await work.insert(Junction, values)
  }
  await insertLayers(work, device)
}

export async function markDeviceDeleted(work: Work, deviceId: string, deletedAt: Date | null): Promise<void> {
  await work.update(Device, { id: deviceId }, { deletedAt })
}

async function insertStack(work: Work, device: DeviceWithStack): Promise<void> {
  await work.insert(
    Junction,
    device.junctions.map((junction) => junctionRow(junction, device.id)),
  )
  await insertLayers(work, device)
}

async function insertLayers(work: Work, device: DeviceWithStack): Promise<void> {
  if (device.layers.length === 0) return
  await work.insert(
    Layer,
    device.layers.map(({ id, position, name, material, thicknessNm, junctionIndex }) => ({
      id,
      deviceId: device.id,
      position,
      name,
      material,
      thicknessNm,
      junctionIndex,
    })),
  )
}

function rowOf({ junctions: _junctions, layers: _layers, ...row }: DeviceWithStack) {
  return row
}

function junctionRow({ id, position, label, absorber, nominalGapEv, thicknessNm }: JunctionRow, deviceId: string) {
  return { id, deviceId, position, label, absorber, nominalGapEv, thicknessNm }
}

async function withStack(work: Work, device: Device): Promise<DeviceWithStack> {
  const [complete] = await withStacks(work, [device])
  return complete!
}

/** Two queries for any number of devices. */
async function withStacks(work: Work, devices: Device[]): Promise<DeviceWithStack[]> {
  if (devices.length === 0) return []
  const deviceId = In(devices.map((device) => device.id))
  const order = { deviceId: 'ASC', position: 'ASC' } as const
  const [junctions, layers] = await Promise.all([
    work.find(Junction, { where: { deviceId }, order }),
    work.find(Layer, { where: { deviceId }, order }),
  ])
  const complete = new Map<string, DeviceWithStack>()
  for (const device of devices) complete.set(device.id, { ...device, junctions: [], layers: [] })
  for (const junction of junctions) complete.get(junction.deviceId)?.junctions.push(junction)
  for (const layer of layers) complete.get(layer.deviceId)?.layers.push(layer)
  return [...complete.values()]
}
