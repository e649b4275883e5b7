/** A share as per cent, "12.3 %". */
export const percent = (share: number, digits = 1): string => `${(100 * share).toFixed(digits)} %`

/** A band, "400–520 nm". */
export const band = ([from, to]: readonly [number, number]): string => `${Math.round(from)}–${Math.round(to)} nm`

/** A junction by its number from the sunward side. */
export const junctionName = (index: number): string => `junction ${index + 1}`

/** "junctions 1 and 3". */
export function junctionNames(indices: readonly number[]): string {
  if (indices.length === 1) return junctionName(indices[0]!)
  const numbers = indices.map((i) => String(i + 1))
  return `junctions ${numbers.slice(0, -1).join(', ')} and ${numbers.at(-1)!}`
}
