import { describe, expect, test } from 'vitest'
import { ago } from '../../../src/formats/dates.js'
import { numberOf } from '../../../src/formats/numberInput.js'
import { counted, currentDensity, fileSize, fixed, trimmed, wavelengthRange } from '../../../src/formats/numbers.js'

describe('numbers on the screen', () => {
  test.each([
    [18.456, 2, '18.46'],
    [-0.5, 1, '−0.5'],
    [-0.004, 2, '0.00'],
    [null, 2, '–'],
    [Number.NaN, 2, '–'],
  ])('fixed(%s, %i) is %s', (value, digits, text) => expect(fixed(value, digits)).toBe(text))

  test('a value carries its unit, a missing one does not', () => {
    expect(currentDensity(18.4)).toBe('18.40\u00a0mA/cm²')
    expect(currentDensity(null)).toBe('–')
  })
  test('zeros at the end go, those before the point stay', () => {
    expect([trimmed(300, 1), trimmed(0.5, 3), trimmed(1e3, 0)]).toEqual(['300', '0.5', '1000'])
    expect(wavelengthRange([280, 1200.5])).toBe('280 to 1200.5\u00a0nm')
  })
  test('counts agree with their nouns', () => {
    expect([counted(1, 'scan'), counted(0, 'scan'), counted(2, 'person', 'people')]).toEqual([
      '1 scan',
      '0 scans',
      '2 people',
    ])
  })
  test.each([
    [0, '0\u00a0B'],
    [999, '999\u00a0B'],
    [6400, '6.4\u00a0kB'],
    [5_000_000, '5\u00a0MB'],
  ])('%i bytes are %s', (bytes, text) => expect(fileSize(bytes)).toBe(text))
})

describe('numbers as people type them', () => {
  test.each([
    ['', null],
    ['  ', null],
    ['1,68', 1.68],
    ['180 000', 180_000],
    ['−3', -3],
    ['1e-3', 1e-3],
  ])('%s is read as %s', (text, value) => expect(numberOf(text)).toBe(value))
  test.each(['1.2.3', '1,680.5', 'about 2', '0x10'])('%s is no number', (text) => expect(numberOf(text)).toBeNaN())
})

test.each([
  ['2026-05-04T08:29:40Z', 'just now'],
  ['2026-05-04T08:00:00Z', '30 minutes ago'],
  ['2026-05-03T07:30:00Z', 'yesterday'],
  ['2026-02-01T08:30:00Z', '3 months ago'],
])('%s is %s', (iso, text) => expect(ago(iso, Date.parse('2026-05-04T08:30:00Z'))).toBe(text))
