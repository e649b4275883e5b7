import { defineStore } from 'pinia'
import { ref } from 'vue'

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

/** Short sentences at the foot of the page, one at a time. */
export const useNoticesStore = defineStore('notices', () => {
  const queue = ref<Notice[]>([])
  let count = 0
  function add(notice: Omit<Notice, 'id'>): void {
    count += 1
    queue.value.push({ ...notice, id: count })
  }
  function drop(id: number): void {
    queue.value = queue.value.filter((notice) => notice.id !== id)
  }
  return { queue, add, drop }
})
