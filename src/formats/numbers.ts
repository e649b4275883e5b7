/** Numbers as the screens show them: a fixed number of digits, a true minus, the unit beside. */
const MINUS = '\u2212'
const MISSING = '–'

export function fixed(value: number | null | undefined, digits: number): string {
  if (value === null || value === undefined || !Number.isFinite(value)) return MISSING
  const text = Math.abs(value).toFixed(digits)
  return value < 0 && Number(text) !== 0 ? `${MINUS}${text}` : text
}

const withUnit = (digits: number, unit: string) => (value: number | null | undefined) =>
  value === null || value === undefined ? MISSING : `${fixed(value, digits)}\u00a0${unit}`

export const currentDensity = withUnit(2, 'mA/cm²')
export const percent = withUnit(1, '%')
export const irradiance = withUnit(2, 'W/m²')
export const energy = withUnit(3, 'eV')
export const area = withUnit(3, 'cm²')
export const wavelength = (value: number | null | undefined) =>
  value === null || value === undefined ? MISSING : `${trimmed(value, 1)}\u00a0nm`
export const wavelengthRange = (range: readonly [number, number] | null | undefined) =>
  range ? `${trimmed(range[0], 1)} to ${trimmed(range[1], 1)}\u00a0nm` : MISSING
export const share = (value: number | null | undefined) =>
  value === null || value === undefined ? MISSING : percent(value * 100)

/** At most so many digits, without zeros at the end. */
export function trimmed(value: number, digits: number): string {
  return fixed(value, digits)
    .replace(/(\.\d*?)0+$/, '$1')
    .replace(/\.$/, '')
}

/** A count with its noun: `1 scan`, `12 scans`. */
export function counted(count: number, noun: string, nouns = `${noun}s`): string {
  return `${count.toLocaleString('en-GB')} ${count === 1 ? noun : nouns}`
}

const SIZES = ['B', 'kB', 'MB', 'GB'] as const
export function fileSize(bytes: number): string {
  const step = Math.min(SIZES.length - 1, bytes > 0 ? Math.floor(Math.log10(bytes) / 3) : 0)
  return `${trimmed(bytes / 1000 ** step, step === 0 ? 0 : 1)}\u00a0${SIZES[step]}`
}
