import { z } from 'zod'

/** Building blocks of the contract. Units stand in the names of fields; times are ISO 8601 in UTC. */

export const Id = z.uuid().meta({ description: 'UUID, version 7' })
export const Timestamp = z.iso.datetime({ offset: true }).meta({ description: 'ISO 8601, UTC' })
export const CalendarDate = z.iso.date()
export const Version = z
  .int()
  .min(1)
  .meta({ description: 'Counts the saves of what people edit; send back the one you read' })

export const Name = z.string().trim().min(1, 'A name is needed.').max(120, 'A name has at most 120 characters.')
export const ShortText = z.string().trim().max(200)
export const LongText = z.string().trim().max(4000)
export const Reason = z.string().trim().min(3, 'Give a reason in a few words.').max(1000)
export const EmailAddress = z.email('This is not an e-mail address.').trim().toLowerCase().max(254)
export const NewPassword = z
  .string()
  .min(12, 'A password has at least 12 characters.')
  .max(200, 'A password has at most 200 characters.')

export const Finite = z.number()
export const Positive = z.number().positive()
export const NotNegative = z.number().nonnegative()

/** Query of every list that pages: an opaque cursor and a page size. */
export const PageQuery = z.object({
  cursor: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(100),
})
export type PageQuery = z.infer<typeof PageQuery>

/** A page of a list: its items, the total over all pages, and the cursor of the next page. */
export const pageOf = <Item extends z.ZodType>(item: Item) =>
  z.object({ items: z.array(item), total: z.int().min(0), nextCursor: z.string().nullable() })
export interface Page<Item> {
  items: Item[]
  total: number
  nextCursor: string | null
}

/** A curve as it travels: wavelengths in nm, strictly increasing, and one value for each. */
export const CurveData = z
  .object({ wavelengthNm: z.array(Positive), values: z.array(Finite) })
  .meta({ id: 'Curve', description: 'Linear between its points' })
export type CurveData = z.infer<typeof CurveData>

/** Who did something; a person who was removed keeps the name. */
export const PersonReference = z.object({ id: Id, name: z.string() }).meta({ id: 'PersonReference' })
export type PersonReference = z.infer<typeof PersonReference>

/** Reply of a route that leaves nothing behind to show. */
export const Nothing = z.null()
