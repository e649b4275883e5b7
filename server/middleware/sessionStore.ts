import session from 'express-session'
import type { Database } from '../database/transaction.js'
import { deleteSession, readSession, saveSession, touchSession } from '../database/repositories/sessions.js'

/** Being used is written down at most this often, so that reading a page writes nothing to the database. */
const TOUCH_EVERY_MS = 60_000

/** Sessions live in MariaDB, so that any server answers for any browser. */
export class DatabaseSessionStore extends session.Store {
  constructor(private readonly database: Database) {
    super()
  }

  override get(id: string, done: (error: unknown, data?: session.SessionData | null) => void): void {
    readSession(this.database.work, id, new Date()).then((record) => {
      if (!record) return done(null, null)
      const data = JSON.parse(record.data) as session.SessionData
      done(null, { ...data, touchedAt: record.lastUsedAt.getTime() })
    }, done)
  }

  override set(id: string, data: session.SessionData, done: (error?: unknown) => void = () => undefined): void {
    saveSession(this.database.work, {
      id,
      userId: data.passport?.user ?? null,
      data: JSON.stringify(data),
      client: (data.client ?? '').slice(0, 200),
      at: new Date(),
      expiresAt: expiryOf(data),
    }).then(() => done(), done)
  }

  override touch(id: string, data: session.SessionData, done: (error?: unknown) => void = () => undefined): void {
    if (Date.now() - (data.touchedAt ?? 0) < TOUCH_EVERY_MS) return done()
    touchSession(this.database.work, id, new Date(), expiryOf(data)).then(() => done(), done)
  }

  override destroy(id: string, done: (error?: unknown) => void = () => undefined): void {
    deleteSession(this.database.work, id).then(() => done(), done)
  }
}

function expiryOf(data: session.SessionData): Date {
  return data.cookie.expires
    ? new Date(data.cookie.expires)
    : new Date(Date.now() + (data.cookie.originalMaxAge ?? 86_400_000))
}

declare module 'express-session' {
  interface SessionData {
    csrfToken?: string
    client?: string
    /** When its use was last written down, ms. */
    touchedAt?: number
    passport?: { user?: string }
  }
}
