import { z } from 'zod'
import { ApiError } from '../../shared/contract/errors.js'
import type { NamePosition, TimePosition } from '../database/repositories/position.js'

/** A cursor is the position of a page's last item, opaque to the client. */
const encode = (position: { id: string }) => Buffer.from(JSON.stringify(position)).toString('base64url')

/** The cursor of the next page; null where the page was not full. */
export function cursorAfter<Item>(
  items: readonly Item[],
  limit: number,
  positionOf: (item: Item) => TimePosition | NamePosition,
): string | null {
  const last = items.at(-1)
  return last !== undefined && items.length >= limit ? encode(positionOf(last)) : null
}

const Time = z.strictObject({ at: z.iso.datetime().transform((text) => new Date(text)), id: z.uuid() })
const Named = z.strictObject({ name: z.string(), id: z.uuid() })

export const timePosition = (cursor: string | undefined): TimePosition | null => decode(Time, cursor)
export const namePosition = (cursor: string | undefined): NamePosition | null => decode(Named, cursor)

function decode<Position>(schema: z.ZodType<Position>, cursor: string | undefined): Position | null {
  if (cursor === undefined) return null
  const parsed = schema.safeParse(jsonOf(Buffer.from(cursor, 'base64url').toString('utf8')))
  if (parsed.success) return parsed.data
  const message = 'The cursor is not one that this list gave; start again without it.'
  throw new ApiError('INPUT_INVALID', { errors: [{ path: ['cursor'], message }] }, message)
}

function jsonOf(text: string): unknown {
  try {
    return JSON.parse(text)
  } catch {
    return null
  }
}
