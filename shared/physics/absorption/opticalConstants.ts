import { DomainError } from '../errors.js'
import { indexAtOrBelow } from '../curve.js'

/**
 * Complex refractive index n + ik of a material. `wavelengthNm` strictly increasing, nm; `n` and `k` dimensionless,
 * k zero or above; all of one length. Linear between the points; unknown outside them.
 */
export interface OpticalConstants {
  readonly wavelengthNm: ArrayLike<number>
  readonly n: ArrayLike<number>
  readonly k: ArrayLike<number>
  /** The name used in messages. */
  readonly name?: string
}

/** Materials by their id: the library's own and a project's uploads. */
export type MaterialLibrary = Readonly<Record<string, OpticalConstants>>

/**
 * Checks a table of optical constants.
 * @throws DomainError for fewer than two rows, lengths that differ, wavelengths not increasing, n not above zero or k
 * below zero; it names the row.
 */
export function assertOpticalConstants(table: OpticalConstants, argument: string): void {
  const { wavelengthNm, n, k } = table
  const rows = wavelengthNm.length
  if (rows < 2) throw new DomainError(argument, `${argument} has ${rows} rows; it needs at least two.`)
  if (n.length !== rows || k.length !== rows)
    throw new DomainError(
      argument,
      `${argument} has ${rows} wavelengths, ${n.length} values of n and ${k.length} of k; each row needs all three.`,
    )
  for (let i = 0; i < rows; i++) {
    const at = `${argument}, row ${i + 1}`
    if (!(wavelengthNm[i]! > (i > 0 ? wavelengthNm[i - 1]! : 0)) || !Number.isFinite(wavelengthNm[i]!))
      throw new DomainError(argument, `${at}: the wavelength ${wavelengthNm[i]} nm must be above the one before it.`)
    if (!(n[i]! > 0) || !Number.isFinite(n[i]!))
      throw new DomainError(argument, `${at}: n is ${n[i]}; it must be a number above zero.`)
    if (!(k[i]! >= 0) || !Number.isFinite(k[i]!))
      throw new DomainError(argument, `${at}: k is ${k[i]}; it must be zero or a number above zero.`)
  }
}

/** The material of a library by its id. @throws DomainError that lists the ids when there is none of that name. */
export function materialById(materials: MaterialLibrary, id: string, argument: string): OpticalConstants {
  const material = Object.hasOwn(materials, id) ? materials[id] : undefined
  if (!material)
    throw new DomainError(
      argument,
      `${argument} is "${id}"; no such material is known. Known are: ${Object.keys(materials).join(', ')}.`,
    )
  return material.name ? material : { ...material, name: id }
}

/** First and last wavelength of a table, nm. */
export function opticalRangeNm(table: OpticalConstants): [number, number] {
  return [table.wavelengthNm[0]!, table.wavelengthNm[table.wavelengthNm.length - 1]!]
}

/**
 * One column of a table at given wavelengths, linear between its points.
 * @param column `table.n` or `table.k`.
 * @param out same length as `wavelengthNm`; filled and returned.
 * @throws DomainError with the table's range when a wavelength lies outside it: nothing is extrapolated.
 * Cost O(m log n) for m wavelengths in a table of n rows.
 */
export function opticalColumnAt(
  table: OpticalConstants,
  column: ArrayLike<number>,
  wavelengthNm: Float64Array,
  out: Float64Array = new Float64Array(wavelengthNm.length),
): Float64Array {
  const grid = table.wavelengthNm instanceof Float64Array ? table.wavelengthNm : Float64Array.from(table.wavelengthNm)
  const last = grid.length - 1
  for (let i = 0; i < wavelengthNm.length; i++) {
    const x = wavelengthNm[i]!
    if (!(x >= grid[0]! && x <= grid[last]!)) throw outsideRange(table, x)
    const j = Math.min(indexAtOrBelow(grid, x), last - 1)
    const t = (x - grid[j]!) / (grid[j + 1]! - grid[j]!)
    out[i] = column[j]! + t * (column[j + 1]! - column[j]!)
  }
  return out
}

/** The error for a wavelength that a table does not reach. */
export function outsideRange(table: OpticalConstants, wavelengthNm: number): DomainError {
  const [from, to] = opticalRangeNm(table)
  return new DomainError(
    'wavelengthNm',
    `${table.name ?? 'The material'} is known from ${from} to ${to} nm; it was asked for at ` +
      `${Number(wavelengthNm.toFixed(3))} nm. Nothing is extrapolated: choose a material that reaches so far, the ` +
      `parametric edge, or a shorter range.`,
  )
}
