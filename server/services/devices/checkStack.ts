import type { NewDevice } from '../../../shared/contract/devices.js'
import { ApiError, type FieldError } from '../../../shared/contract/errors.js'

/** Junction ids may only be those of the device's own junctions, each once. */
export function requireKnownJunctions(input: NewDevice, known: readonly { id: string }[]): void {
  const own = new Set(known.map((junction) => junction.id))
  const errors = input.junctions.flatMap((junction, i): FieldError[] => {
    if (junction.id === undefined || own.delete(junction.id)) return []
    return [
      { path: ['junctions', i, 'id'], message: 'This is not the id of a junction of this device, or it comes twice.' },
    ]
  })
  refuse(errors)
}

/** Every layer that names a junction names one that the device has. */
export function requireSoundStack(input: NewDevice): void {
  refuse(
    input.layers.flatMap((layer, i): FieldError[] =>
      layer.junctionIndex === null || layer.junctionIndex < input.junctions.length
        ? []
        : [
            {
              path: ['layers', i, 'junctionIndex'],
              message: `The layer ${layer.name} absorbs for junction ${layer.junctionIndex + 1}, but the device has ${input.junctions.length}.`,
            },
          ],
    ),
  )
}

function refuse(errors: FieldError[]): void {
  if (errors.length > 0) throw new ApiError('INPUT_INVALID', { errors }, errors.map((error) => error.message).join(' '))
}
