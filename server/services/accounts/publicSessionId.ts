import { createHash } from 'node:crypto'

/** Names a session towards its owner without giving away the id that a cookie carries. */
export function publicSessionId(id: string): string {
  return createHash('sha256').update(`session ${id}`).digest('hex').slice(0, 32)
}
