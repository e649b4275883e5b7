import { sentenceOf } from '../errors/sentences.js'
import { useNoticesStore, type NoticeAction } from '../stores/notices.js'

/** Says at the foot of the page what was done, with a way back where there is one, or what failed. */
export function useNotices() {
  const store = useNoticesStore()
  return {
    show: (notice: { text: string; action?: NoticeAction }) => store.add({ ...notice, kind: 'done' }),
    failed: (error: unknown) => store.add({ text: sentenceOf(error), kind: 'failed' }),
  }
}
