import type { ColumnRole } from './readingResult.js'
import { unitInHeader } from './units.js'
import { JUNCTION_WORDS, LETTER_ROLES, ROLE_WORDS } from './vocabulary.js'

export interface HeaderRole {
  role: ColumnRole
  /** The word or unit that told it. */
  by: string
}

/** Lower case, without accents; what is neither letter nor digit becomes a blank. */
export function plainWords(text: string): string {
  return text
    .toLowerCase()
    .replaceAll('ł', 'l')
    .replaceAll('ß', 'ss')
    .replaceAll('ø', 'o')
    .normalize('NFD')
    .replace(/\p{M}/gu, '')
    .normalize('NFC')
    .replace(/[^\p{L}\p{N}]+/gu, ' ')
    .trim()
}

const PLAIN_ROLE_WORDS = ROLE_WORDS.map(({ role, words }) => ({ role, words: words.map(plainWords) }))
const PLAIN_JUNCTION_WORDS = new Set(JUNCTION_WORDS.map(plainWords))

const holds = (text: string, word: string) => ` ${text} `.includes(` ${word} `)

/** What a header says its column holds; null when it says nothing that is known. */
export function roleInHeader(header: string): HeaderRole | null {
  const unit = unitInHeader(header)
  const text = plainWords(header)
  if (unit?.of === 'value' && unit.unit.startsWith('W') && !holds(text, 'noise'))
    return { role: 'irradiance', by: header }
  if (unit?.of === 'value' && unit.unit === 'uW/cm2/nm') return { role: 'irradiance', by: header }
  for (const { role, words } of PLAIN_ROLE_WORDS) {
    const word = words.find((candidate) => holds(text, candidate))
    if (word === undefined) continue
    if (role === 'eqe' && unit?.of === 'value' && unit.unit === 'A/W') return { role: 'responsivity', by: 'A/W' }
    return { role, by: word }
  }
  if (unit?.of === 'value' && unit.unit === 'A/W') return { role: 'responsivity', by: 'A/W' }
  const letter = LETTER_ROLES[text.split(' ')[0] ?? '']
  if (letter && /^[a-z](?: percent| fraction)?$/.test(text)) return { role: letter, by: text }
  if (unit?.of === 'wavelength' && text.split(' ').length <= 2) return { role: 'wavelength', by: unit.unit }
  return null
}

/** Whether a header names a junction or a device, and so leaves the quantity to its context. */
export const namesJunction = (header: string): boolean =>
  plainWords(header)
    .split(' ')
    .some((word) => PLAIN_JUNCTION_WORDS.has(word) || /^(?:j|jct|junction|cell)\d$/.test(word))

/** Quantity that a title, a sheet's name or a file's name speaks of. */
export function quantityInContext(texts: readonly string[]): ColumnRole | null {
  const wanted: ColumnRole[] = ['eqe', 'responsivity', 'reflectance', 'transmittance', 'irradiance']
  for (const text of texts) {
    const role = PLAIN_ROLE_WORDS.filter((entry) => wanted.includes(entry.role)).find(({ words }) =>
      words.some((word) => holds(plainWords(text), word)),
    )?.role
    if (role) return role
  }
  return null
}
