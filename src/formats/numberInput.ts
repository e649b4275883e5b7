/** A number field as people fill it: empty means "not known"; a decimal comma and blanks between digits are understood. */
export function numberOf(text: string): number | null {
  const plain = text
    .replace(/[\s\u00a0\u202f]/g, '')
    .replace(',', '.')
    .replace('\u2212', '-')
  if (plain === '') return null
  return /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain) ? Number(plain) : Number.NaN
}

export const textOf = (value: number | null): string => (value === null ? '' : String(value))
