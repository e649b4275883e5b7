import { computed, shallowRef, toValue, triggerRef, type MaybeRefOrGetter } from 'vue'
import type { FileReading } from '../../shared/contract/scans.js'
import { uploadFiles } from '../api/scans.js'
import { uploadSpectrumFiles } from '../api/spectra.js'
import { sentenceOf } from '../errors/sentences.js'
import { useRefresh } from './refresh.js'

/** One file on its way to the server; `share` runs from 0 to 1 while its bytes travel. */
export interface FileUpload {
  key: number
  file: File
  state: 'waiting' | 'sending' | 'reading' | 'done' | 'failed'
  share: number
  reading: FileReading | null
  error: string | null
}

const AT_ONCE = 3

/** Uploads files, each in a request of its own, so that one bad file holds up no other. */
export function useUploadFiles(projectId: MaybeRefOrGetter<string>, kind: 'scan' | 'spectrum' = 'scan') {
  const send = kind === 'scan' ? uploadFiles : uploadSpectrumFiles
  const refresh = useRefresh()
  const uploads = shallowRef<FileUpload[]>([])
  const isBusy = computed(() => uploads.value.some((upload) => !['done', 'failed'].includes(upload.state)))
  let count = 0
  let running = 0

  function add(files: Iterable<File>): void {
    for (const file of files) {
      count += 1
      uploads.value.push({ key: count, file, state: 'waiting', share: 0, reading: null, error: null })
    }
    triggerRef(uploads)
    startNext()
  }
  function startNext(): void {
    while (running < AT_ONCE) {
      const next = uploads.value.find((upload) => upload.state === 'waiting')
      if (!next) return
      running += 1
      void run(next).finally(() => {
        running -= 1
        startNext()
      })
    }
  }
  async function run(upload: FileUpload): Promise<void> {
    change(upload, { state: 'sending' })
    try {
      const reply = await send(toValue(projectId), [upload.file], (share) =>
        change(upload, { share, state: share >= 1 ? 'reading' : 'sending' }),
      )
      change(upload, { state: 'done', share: 1, reading: reply.items[0] ?? null })
      void refresh.project(toValue(projectId))
    } catch (error) {
      change(upload, { state: 'failed', error: sentenceOf(error) })
    }
  }
  function change(upload: FileUpload, part: Partial<FileUpload>): void {
    Object.assign(upload, part)
    triggerRef(uploads)
  }
  /** Sends a file that failed once more. */
  function retry(key: number): void {
    const upload = uploads.value.find((one) => one.key === key && one.state === 'failed')
    if (!upload) return
    change(upload, { state: 'waiting', share: 0, error: null })
    startNext()
  }
  /** Puts a new reading in the place of the one shown, after a corrected mapping. */
  function replaceReading(key: number, reading: FileReading): void {
    const upload = uploads.value.find((one) => one.key === key)
    if (upload) change(upload, { reading })
  }
  function remove(key: number): void {
    uploads.value = uploads.value.filter((upload) => upload.key !== key)
  }
  return { uploads, isBusy, add, retry, remove, replaceReading }
}
