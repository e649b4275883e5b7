import { VueQueryPlugin } from '@tanstack/vue-query'
import { flushPromises, mount } from '@vue/test-utils'
import { beforeEach, describe, expect, test, vi } from 'vitest'
import { defineComponent } from 'vue'
import { useUploadFiles } from '../../../src/composables/uploads.js'
import { createQueryClient } from '../../../src/plugins/query.js'
import { FakeServer } from '../fakeServer.js'
import { idOf, session } from '../samples.js'

/** A request that the test moves on by hand: bytes sent, then an answer. */
class HeldRequest {
  static all: HeldRequest[] = []
  upload: { onprogress?: (event: { lengthComputable: boolean; loaded: number; total: number }) => void } = {}
  onload?: () => void
  onerror?: () => void
  onabort?: () => void
  status = 0
  responseText = ''
  url = ''
  headers: Record<string, string> = {}
  form: FormData | null = null

  open(_method: string, url: string): void {
    this.url = url
  }
  setRequestHeader(name: string, value: string): void {
    this.headers[name] = value
  }
  getResponseHeader = () => 'application/json'
  send(form: FormData): void {
    this.form = form
    HeldRequest.all.push(this)
  }
  abort(): void {
    this.onabort?.()
  }
  sent(loaded: number, total: number): void {
    this.upload.onprogress?.({ lengthComputable: true, loaded, total })
  }
  async answer(status: number, body: unknown): Promise<void> {
    this.status = status
    this.responseText = JSON.stringify(body)
    this.onload?.()
    await flushPromises()
  }
}

const reading = (name: string) => ({
  file: {
    id: idOf(500),
    name,
    sizeBytes: 10,
    sha256: 'a'.repeat(64),
    uploadedAt: '2026-05-04T08:30:00.000Z',
    uploadedBy: { id: idOf(1), name: 'Ines Okafor' },
    state: 'uploaded',
    scanIds: [],
  },
  recognisedAs: null,
  tables: [],
  mapping: null,
  mappingOrigin: null,
  series: [],
  notes: [],
  problem: null,
})
const file = (name: string) => new File(['300,0.5'], name)

function startUploading(kind: 'scan' | 'spectrum' = 'scan') {
  let uploading!: ReturnType<typeof useUploadFiles>
  const Uploader = defineComponent({
    setup() {
      uploading = useUploadFiles(idOf(100), kind)
      return () => null
    },
  })
  mount(Uploader, {
    global: { plugins: [[VueQueryPlugin, { queryClient: createQueryClient(() => undefined) }]] },
  })
  return uploading
}
const states = (uploading: ReturnType<typeof useUploadFiles>) => uploading.uploads.value.map((one) => one.state)

describe('uploading many files', () => {
  beforeEach(() => {
    HeldRequest.all = []
    new FakeServer(session())
    vi.stubGlobal('XMLHttpRequest', HeldRequest)
  })

  test('each file travels alone, three at a time, with its own progress', async () => {
    const uploading = startUploading()
    uploading.add(['a.csv', 'b.csv', 'c.csv', 'd.csv'].map(file))
    await flushPromises()
    expect(HeldRequest.all).toHaveLength(3)
    expect(HeldRequest.all.map((one) => (one.form?.get('files') as File).name)).toEqual(['a.csv', 'b.csv', 'c.csv'])
    expect(states(uploading)).toEqual(['sending', 'sending', 'sending', 'waiting'])
    HeldRequest.all[1]!.sent(3, 12)
    expect(uploading.uploads.value.map((one) => one.share)).toEqual([0, 0.25, 0, 0])
    HeldRequest.all[1]!.sent(12, 12)
    expect(states(uploading)[1]).toBe('reading')
    await HeldRequest.all[1]!.answer(201, { items: [reading('b.csv')] })
    expect(states(uploading)).toEqual(['sending', 'done', 'sending', 'sending'])
    expect(uploading.uploads.value[1]?.reading?.file.name).toBe('b.csv')
    expect(HeldRequest.all).toHaveLength(4)
    expect(uploading.isBusy.value).toBe(true)
  })

  test('a refused file says why, holds up no other, and can be sent again', async () => {
    const uploading = startUploading()
    uploading.add([file('broken.xlsx'), file('good.csv')])
    await flushPromises()
    const problem = {
      type: 'urn:tierlight:FILE_UNREADABLE',
      title: 'The file cannot be read',
      status: 422,
      detail: 'broken.xlsx is not a complete workbook.',
      code: 'FILE_UNREADABLE',
      details: { fileName: 'broken.xlsx', reason: 'truncated' },
    }
    await HeldRequest.all[0]!.answer(422, problem)
    await HeldRequest.all[1]!.answer(201, { items: [reading('good.csv')] })
    expect(states(uploading)).toEqual(['failed', 'done'])
    expect(uploading.uploads.value[0]?.error).toBe('broken.xlsx is not a complete workbook.')
    uploading.retry(uploading.uploads.value[0]!.key)
    await flushPromises()
    await HeldRequest.all[2]!.answer(201, { items: [reading('broken.xlsx')] })
    expect(states(uploading)).toEqual(['done', 'done'])
    expect(uploading.isBusy.value).toBe(false)
  })

  test('a connection that breaks is said as such', async () => {
    const uploading = startUploading()
    uploading.add([file('a.csv')])
    await flushPromises()
    HeldRequest.all[0]!.onerror?.()
    await flushPromises()
    expect(uploading.uploads.value[0]?.error).toContain('The server cannot be reached.')
  })

  test('changes carry the token of the session; spectra go to their own address', async () => {
    startUploading('spectrum').add([file('lamp.csv')])
    await flushPromises()
    expect(HeldRequest.all[0]?.url).toBe(`/api/projects/${idOf(100)}/spectrum-files`)
    expect(HeldRequest.all[0]?.headers['x-csrf-token']).toBe('first-token')
    expect(HeldRequest.all[0]?.headers['content-type']).toBeUndefined()
  })
})
