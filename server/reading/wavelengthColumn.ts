import type { WavelengthUnit } from '../../shared/contract/scans.js'

/** Ranges in which scans of solar cells lie, by unit; the first that holds all numbers is taken. */
const RANGES: { unit: WavelengthUnit; from: number; to: number }[] = [
  { unit: 'angstrom', from: 1900, to: 60_000 },
  { unit: 'nm', from: 100, to: 6000 },
  { unit: 'um', from: 0.15, to: 6 },
  { unit: 'eV', from: 0.2, to: 8 },
]

/**
 * The unit that a range of numbers speaks for. Micrometres and electronvolts overlap: a solar scan in µm begins below
 * 0.6 and ends below 2.6; one in eV begins above 0.6 or ends above 2.6. Above 4000 with a start above 1900 it is Å.
 */
export function wavelengthUnitByRange(numbers: readonly (number | null)[]): {
  unit: WavelengthUnit
  isAmbiguous: boolean
} {
  const [smallest, largest] = extent(numbers)
  if (smallest >= 1900 && largest > 4500) return { unit: 'angstrom', isAmbiguous: false }
  if (largest > 20) return { unit: 'nm', isAmbiguous: false }
  if (largest > 2.6) return { unit: 'eV', isAmbiguous: false }
  return smallest < 0.6 ? { unit: 'um', isAmbiguous: largest > 1.9 } : { unit: 'eV', isAmbiguous: true }
}

/** Numbers that run strictly one way within the range of some unit, or do so again and again. */
export function looksLikeWavelengths(numbers: readonly (number | null)[]): boolean {
  const values = numbers.filter((value) => value !== null)
  if (values.length < 2 || values.length < 0.5 * numbers.length) return false
  const [smallest, largest] = extent(values)
  if (!RANGES.some(({ from, to }) => smallest >= from && largest <= to)) return false
  if (!(largest > 1.05 * smallest)) return false
  let up = 0
  let down = 0
  for (let i = 1; i < values.length; i++) {
    if (values[i]! > values[i - 1]!) up++
    else if (values[i]! < values[i - 1]!) down++
  }
  return Math.max(up, down) >= 0.9 * (values.length - 1)
}

function extent(numbers: readonly (number | null)[]): [number, number] {
  let smallest = Infinity
  let largest = -Infinity
  for (const value of numbers) {
    if (value === null) continue
    smallest = Math.min(smallest, value)
    largest = Math.max(largest, value)
  }
  return [smallest, largest]
}

export interface Run {
  /** First and last row of the run, last included. */
  from: number
  to: number
}

/** Stretches of rows over which the wavelengths run strictly one way. */
export function runsOf(numbers: readonly (number | null)[]): Run[] {
  const runs: Run[] = []
  let from = 0
  let direction = 0
  for (let i = 1; i < numbers.length; i++) {
    const step = Math.sign((numbers[i] ?? NaN) - (numbers[i - 1] ?? NaN))
    if (Number.isNaN(step)) continue
    if (i === from + 1 && step !== 0) direction = step
    else if (step === 0 || step !== direction) {
      runs.push({ from, to: i - 1 })
      from = i
      direction = 0
    }
  }
  runs.push({ from, to: numbers.length - 1 })
  return runs
}

const SHORTEST_SCAN = 5

/** Scans written one after the other: several runs over the same wavelengths. One run for an ordinary scan. */
export function appendedScans(numbers: readonly (number | null)[]): Run[] {
  const whole = [{ from: 0, to: numbers.length - 1 }]
  const runs = runsOf(numbers)
  if (runs.length < 2 || runs.length > 32 || runs.some(({ from, to }) => to - from + 1 < SHORTEST_SCAN)) return whole
  const first = new Set(numbers.slice(runs[0]!.from, runs[0]!.to + 1))
  const isSame = runs.slice(1).every(({ from, to }) => {
    const shared = numbers.slice(from, to + 1).filter((value) => first.has(value)).length
    return shared >= 0.8 * Math.max(first.size, to - from + 1)
  })
  return isSame ? runs : whole
}
