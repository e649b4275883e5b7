/** Times in the reader's own zone; what travels is UTC. */
const moment = new Intl.DateTimeFormat('en-GB', {
  day: 'numeric',
  month: 'short',
  year: 'numeric',
  hour: '2-digit',
  minute: '2-digit',
})
const day = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric' })
const relative = new Intl.RelativeTimeFormat('en-GB', { numeric: 'auto' })

export const dateTime = (iso: string | null | undefined): string => (iso ? moment.format(new Date(iso)) : '–')
export const date = (iso: string | null | undefined): string => (iso ? day.format(new Date(iso)) : '–')

const STEPS: [Intl.RelativeTimeFormatUnit, number][] = [
  ['year', 365 * 86_400],
  ['month', 30 * 86_400],
  ['day', 86_400],
  ['hour', 3_600],
  ['minute', 60],
]

/** `3 hours ago`; the full time belongs in a title beside it. */
export function ago(iso: string | null | undefined, now = Date.now()): string {
  if (!iso) return '–'
  const seconds = (new Date(iso).getTime() - now) / 1000
  const step = STEPS.find(([, size]) => Math.abs(seconds) >= size)
  return step ? relative.format(Math.trunc(seconds / step[1]), step[0]) : 'just now'
}
