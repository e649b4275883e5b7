import type { Page } from '../../shared/contract/primitives.js'

const MOST_PAGES = 50

/** Follows the cursors of a list to its end; for tables that sort and filter on the page itself. */
export async function everyItem<Item>(read: (cursor: string | undefined) => Promise<Page<Item>>): Promise<Item[]> {
  const items: Item[] = []
  let cursor: string | undefined
  for (let page = 0; page < MOST_PAGES; page++) {
    const reply = await read(cursor)
    items.push(...reply.items)
    if (reply.nextCursor === null) break
    cursor = reply.nextCursor
  }
  return items
}
