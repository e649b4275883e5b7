/** What was deleted can be brought back for this long. */
export const RESTORABLE_DAYS = 30

/** Deletions after this time can still be taken back. */
export function restorableSince(now: Date = new Date()): Date {
  return new Date(now.getTime() - RESTORABLE_DAYS * 86_400_000)
}
