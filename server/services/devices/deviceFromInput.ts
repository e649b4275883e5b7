import { v7 as uuid } from 'uuid'
import type { NewDevice } from '../../../shared/contract/devices.js'
import type { DeviceWithStack } from '../../database/repositories/devices.js'

type Described = Omit<DeviceWithStack, 'id' | 'projectId' | 'version' | 'createdAt' | 'updatedAt' | 'deletedAt'>

/** What a person described, as rows: positions count from 1 on the sunward side; a junction that has an id keeps it. */
export function describedDevice(deviceId: string, input: NewDevice): Described {
  return {
    name: input.name,
    sampleId: input.sampleId,
    description: input.description,
    series: input.series,
    apertureAreaCm2: input.apertureAreaCm2,
    deviceAreaCm2: input.deviceAreaCm2,
    terminals: input.terminals,
    junctions: input.junctions.map((junction, i) => ({
      ...junction,
      id: junction.id ?? uuid(),
      deviceId,
      position: i + 1,
    })),
    layers: input.layers.map((layer, i) => ({ ...layer, id: uuid(), deviceId, position: i + 1 })),
  }
}
