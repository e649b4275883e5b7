import type { Device as DeviceReply } from '../../shared/contract/devices.js'
import type { DeviceWithStack } from '../database/repositories/devices.js'

export function presentDevice(device: DeviceWithStack): DeviceReply {
  return {
    id: device.id,
    projectId: device.projectId,
    name: device.name,
    sampleId: device.sampleId,
    description: device.description,
    series: device.series,
    apertureAreaCm2: device.apertureAreaCm2,
    deviceAreaCm2: device.deviceAreaCm2,
    terminals: device.terminals,
    junctions: device.junctions.map(({ id, position, label, absorber, nominalGapEv, thicknessNm }) => ({
      id,
      position,
      label,
      absorber,
      nominalGapEv,
      thicknessNm,
    })),
    layers: device.layers.map(({ position, name, material, thicknessNm, junctionIndex }) => ({
      position,
      name,
      material,
      thicknessNm,
      junctionIndex,
    })),
    version: device.version,
    createdAt: device.createdAt.toISOString(),
    updatedAt: device.updatedAt.toISOString(),
    deletedAt: device.deletedAt?.toISOString() ?? null,
  }
}
