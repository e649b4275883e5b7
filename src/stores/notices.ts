import { defineStore } from 'pinia'
import { shallowRef } from 'vue'

/** A way back or onward, offered as a button while the notice stands. */
export interface NoticeAction {
  label: string
  run: () => Promise<unknown>
}
export interface Notice {
  id: number
  text: string
  kind: 'done' | 'failed'
  action?: NoticeAction
}

/** A short sentence at the foot of the page; a new one takes the place of the last, so that it is never late. */
export const useNoticesStore = defineStore('notices', () => {
  const current = shallowRef<Notice | null>(null)
  let count = 0
  function add(notice: Omit<Notice, 'id'>): void {
    count += 1
    current.value = { ...notice, id: count }
  }
  /** Takes a notice away, unless another has taken its place already. */
  function drop(id: number): void {
    if (current.value?.id === id) current.value = null
  }
  return { current, add, drop }
})
