import { afterAll, describe, expect, it } from 'vitest'
import { closeReadingWorkers, readInWorker } from '../../server/reading/readInWorker.js'
import { ReadingError } from '../../server/reading/readingError.js'

afterAll(closeReadingWorkers)

const large = () => Buffer.from(Array.from({ length: 150_000 }, (_, i) => `${300 + i},0.5,0.5,0.5,0.5`).join('\n'))

describe('readInWorker', () => {
  it('gives the scans, as typed arrays', async () => {
    const { scans } = await readInWorker(Buffer.from('nm,EQE\n300,0.1\n310,0.2'), 'a.csv')
    expect(scans[0]!.values).toEqual(Float64Array.of(0.1, 0.2))
  })

  it('brings the error of the reader back as it was', async () => {
    const failed = readInWorker(Buffer.from('nm,EQE\n300,0.1\n310,off\n320,0.2'), 'a.csv')
    await expect(failed).rejects.toBeInstanceOf(ReadingError)
    await expect(failed).rejects.toMatchObject({
      code: 'not-a-number',
      problem: { line: 3, column: 'EQE', value: 'off', expected: 'a number' },
    })
  })

  it('ends a reading at its time limit and reads the next file', async () => {
    await expect(readInWorker(large(), 'large.csv', {}, { timeMs: 1 })).rejects.toMatchObject({ code: 'too-slow' })
    const { scans } = await readInWorker(Buffer.from('nm,EQE\n300,0.1\n310,0.2'), 'a.csv')
    expect(scans).toHaveLength(1)
  })

  it('ends a reading at its memory limit', async () => {
    const failed = readInWorker(large(), 'large.csv', {}, { heapMb: 24 })
    await expect(failed).rejects.toMatchObject({ name: 'ReadingError', code: 'out-of-memory' })
  })
})
