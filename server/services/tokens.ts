import { createHash, randomBytes } from 'node:crypto'

/** A secret for a link: the person gets it by mail, the database keeps only its hash. */
export function newToken(): { token: string; tokenHash: string } {
  const token = randomBytes(32).toString('base64url')
  return { token, tokenHash: hashToken(token) }
}

export function hashToken(token: string): string {
  return createHash('sha256').update(token).digest('hex')
}
