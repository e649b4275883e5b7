import type { Parts } from '../app.js'
import { deleteExpiredSessions } from '../database/repositories/sessions.js'
import { sendDueMail } from '../mail/transport.js'

const MAIL_EVERY_MS = 5_000
const CLEANING_EVERY_MS = 3_600_000

/** What the server does of itself: sends the mail that waits and forgets sessions that ended. */
export function startBackgroundWork(parts: Parts): { stop(): Promise<void> } {
  const tasks = [
    repeat(MAIL_EVERY_MS, () => sendDueMail(parts)),
    repeat(CLEANING_EVERY_MS, () => deleteExpiredSessions(parts.database.work, new Date())),
  ]
  return { stop: async () => void (await Promise.all(tasks.map((task) => task.stop()))) }

  /** Runs `work` again and again, never twice at once; a failure is logged and the next turn comes as usual. */
  function repeat(everyMs: number, work: () => Promise<unknown>): { stop(): Promise<void> } {
    let running: Promise<void> | null = null
    const timer = setInterval(() => {
      running ??= work()
        .then(
          () => undefined,
          (error: unknown) => parts.log.error({ err: error }, 'background work failed'),
        )
        .finally(() => (running = null))
    }, everyMs)
    timer.unref()
    return {
      async stop() {
        clearInterval(timer)
        await running
      },
    }
  }
}
