import { readdirSync, readFileSync, statSync } from 'node:fs'
import { join, relative } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { badFiles } from '../../examples/badFiles.js'
import { exampleFiles } from '../../examples/generate.js'
import { shapedFiles } from '../../examples/shapes.js'
import { truthOfShapes } from '../../examples/truth.js'
import { ReadingError } from '../../server/reading/readingError.js'
import { readMeasurementFile } from '../../server/reading/readMeasurementFile.js'
import type { ReadScan } from '../../server/reading/readingResult.js'
import { shortCircuitCurrentDensity } from '../../shared/physics/currents.js'
import { referenceSpectrum } from '../../shared/physics/spectrum.js'

const FILES = fileURLToPath(new URL('../../examples/files', import.meta.url))
const spectrum = referenceSpectrum('AM1.5G')
const current = ({ wavelengthNm, values }: ReadScan) => shortCircuitCurrentDensity({ wavelengthNm, values }, spectrum)

function filesIn(folder: string): string[] {
  return readdirSync(folder).flatMap((name) => {
    const path = join(folder, name)
    return statSync(path).isDirectory() ? filesIn(path) : [relative(FILES, path)]
  })
}

describe('the committed examples', () => {
  const generated = exampleFiles()

  it('are what the generator writes, file for file', () => {
    expect(filesIn(FILES).sort()).toEqual([...generated.keys()].sort())
  })

  it.each([...generated.keys()])('%s has the bytes of the generator', (name) => {
    expect(readFileSync(join(FILES, name)).equals(generated.get(name)!)).toBe(true)
  })
})

describe('files of every shape give the same currents', () => {
  const truth = truthOfShapes()
  it.each(shapedFiles())('$name: $shape', ({ name, bytes }) => {
    const { jscMaCm2, toleranceMaCm2 } = truth.find((one) => one.file === `shapes/${name}`)!
    const proposed = readMeasurementFile(bytes, name)
    const eqes = proposed.tables.length > 1 ? sideBySide(bytes, name) : proposed.scans
    expect(eqes.map((scan) => scan.quantity)).toEqual(['eqe', 'eqe'])
    eqes.forEach((scan, i) => {
      expect(scan.wavelengthNm).toHaveLength(181)
      expect(Math.abs(current(scan) - jscMaCm2[i]!)).toBeLessThan(toleranceMaCm2)
    })
  })

  /** Each table of its own, under the mapping of the first moved to the columns of the other. */
  function sideBySide(bytes: Uint8Array, name: string): ReadScan[] {
    const { tables, mapping } = readMeasurementFile(bytes, name)
    return tables.flatMap(({ tableIndex, columns }) => {
      const [wavelength, eqe] = columns
      const own = {
        ...mapping,
        tableIndex,
        wavelength: { ...mapping.wavelength, column: wavelength!.index },
        series: [{ ...mapping.series[0]!, column: eqe!.index }],
      }
      return readMeasurementFile(bytes, name, { mapping: own }).scans
    })
  }
})

describe('bad files', () => {
  it('are of twenty kinds and more', () => {
    expect(new Set(badFiles().map((file) => file.what)).size).toBeGreaterThanOrEqual(20)
  })

  it.each(badFiles())('$name, $what: $code', ({ name, bytes, code, line }) => {
    const error = problemOf(bytes, name)
    expect(error).toMatchObject({ code, problem: { line: line ?? null } })
    expect(error.message).toMatch(/^[^\n]{15,}\.$/)
  })
})

function problemOf(bytes: Uint8Array, name: string): ReadingError {
  try {
    readMeasurementFile(bytes, name)
  } catch (error) {
    if (error instanceof ReadingError) return error
    throw error
  }
  throw new Error(`${name} was read.`)
}
