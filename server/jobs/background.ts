import type { Parts } from '../app.js'
import { deleteExpiredSessions } from '../database/repositories/sessions.js'
import { sendDueMail } from '../mail/transport.js'
import { closeChecksWorkers } from './checksInWorker.js'
import { enqueueMissingChecks, runDueJobs } from './runDueJobs.js'

const MAIL_EVERY_MS = 5_000
const JOBS_EVERY_MS = 500
const CLEANING_EVERY_MS = 3_600_000

/** What the server does of itself: sends the mail that waits, runs jobs, and forgets sessions that ended. */
export function startBackgroundWork(parts: Parts): { stop(): Promise<void> } {
  let haveMissingChecks = true
  const jobs = async (): Promise<void> => {
    if (haveMissingChecks) await enqueueMissingChecks(parts.database)
    haveMissingChecks = false
    await runDueJobs(parts.database)
  }
  const tasks = [
    repeat(JOBS_EVERY_MS, jobs),
    repeat(MAIL_EVERY_MS, () => sendDueMail(parts)),
    repeat(CLEANING_EVERY_MS, () => deleteExpiredSessions(parts.database.work, new Date())),
  ]
  return {
    async stop() {
      await Promise.all(tasks.map((task) => task.stop()))
      await closeChecksWorkers()
    },
  }

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
