import { describe, expect, it } from 'vitest'
import { decodeText } from '../../server/reading/decodeText.js'
import { delimitedTable } from '../../server/reading/delimitedTable.js'
import { roleInHeader } from '../../server/reading/headerRole.js'
import { parseNumeral } from '../../server/reading/numerals.js'
import { unitInHeader } from '../../server/reading/units.js'
import { wavelengthUnitByRange } from '../../server/reading/wavelengthColumn.js'
import { zipEntries } from '../../server/reading/zipDirectory.js'
import { workbook } from '../../examples/workbooks.js'

describe('decodeText', () => {
  it.each([
    ['UTF-8', Buffer.from('λ 25 °C')],
    ['UTF-8', Buffer.from('\ufeffλ 25 °C')],
    ['UTF-16', Buffer.from('\ufeffλ 25 °C', 'utf16le')],
    ['UTF-16', Buffer.from('\ufeffλ 25 °C', 'utf16le').swap16()],
  ])('reads %s, with and without a mark', (encoding, bytes) => {
    expect(decodeText(bytes, 'a.txt')).toEqual({ text: 'λ 25 °C', encoding })
  })

  it('takes what is no UTF-8 for ISO-8859-1', () => {
    expect(decodeText(Buffer.from('25 °C, Längen', 'latin1'), 'a.txt')).toEqual({
      text: '25 °C, Längen',
      encoding: 'ISO-8859-1',
    })
  })

  it('UTF-16 without a mark is known by its zero bytes', () => {
    expect(decodeText(Buffer.from('wavelength\t300', 'utf16le'), 'a.txt').text).toBe('wavelength\t300')
  })
})

describe('delimitedTable', () => {
  it.each([
    ['\t', 'a\tb\n1\t2\n3\t4'],
    [';', 'a;b\n1,5;2\n3;4'],
    [',', 'a,b\r\n1,2\n3,4\r5,6'],
    ['blank', 'a   b\n 1   2\n 3 4'],
  ])('finds the separator %j', (separator, text) => {
    const grid = delimitedTable(text)
    expect(grid.separator).toBe(separator)
    expect(grid.rows[0]!.cells).toEqual(['a', 'b'])
    expect(grid.rows.at(-1)!.cells).toHaveLength(2)
  })

  it('counts lines through mixed line ends and quoted line ends', () => {
    const grid = delimitedTable('"Wavelength\n(nm)","EQE, top"\r\n300,0.1\n310,0.2\r\n')
    expect(grid.rows.map((row) => row.cells)).toEqual([
      ['Wavelength (nm)', 'EQE, top'],
      ['300', '0.1'],
      ['310', '0.2'],
    ])
    expect(grid.rows.map((row) => row.line)).toEqual([2, 3, 4])
  })

  it('headers between blanks keep the blanks inside brackets and between words', () => {
    expect(delimitedTable('Wavelength (nm)  EQE (%)\n300 1\n310 2').rows[0]!.cells).toEqual([
      'Wavelength (nm)',
      'EQE (%)',
    ])
    expect(delimitedTable('wl (nm) EQE (%)\n300 1\n310 2').rows[0]!.cells).toEqual(['wl (nm)', 'EQE (%)'])
  })
})

describe('parseNumeral', () => {
  it.each([
    ['1.5e-3', '.', 0.0015],
    ['1,5E-3', ',', 0.0015],
    ['1.5D+02', '.', 150],
    ['\u22120.25', '.', -0.25],
    ['.5', '.', 0.5],
    ['85 %', '.', 85],
    ['1,5', '.', null],
    ['1.234,5', ',', null],
    ['NaN', '.', null],
    ['0x10', '.', null],
    ['1e999', '.', null],
  ] as const)('%s with the mark %s is %s', (text, mark, value) => expect(parseNumeral(text, mark)).toBe(value))
})

describe('headers in several languages', () => {
  it.each([
    ['Wavelength [nm]', 'wavelength'],
    ['Wellenlänge / nm', 'wavelength'],
    ["Longueur d'onde", 'wavelength'],
    ['Longitud de onda (nm)', 'wavelength'],
    ["Lunghezza d'onda", 'wavelength'],
    ['Długość fali', 'wavelength'],
    ['Длина волны, нм', 'wavelength'],
    ['波长 (nm)', 'wavelength'],
    ['파장(nm)', 'wavelength'],
    ['λ (µm)', 'wavelength'],
    ['Photon energy (eV)', 'wavelength'],
    ['EQE_top', 'eqe'],
    ['IPCE (%)', 'eqe'],
    ['Externe Quanteneffizienz', 'eqe'],
    ['Eficiencia cuántica externa', 'eqe'],
    ['外部量子効率', 'eqe'],
    ['EQE (A/W)', 'responsivity'],
    ['Spektrale Empfindlichkeit', 'responsivity'],
    ['Sensibilité spectrale', 'responsivity'],
    ['Reflexionsgrad', 'reflectance'],
    ['R (%)', 'reflectance'],
    ['T', 'transmittance'],
    ['Messunsicherheit EQE', 'noise'],
    ['EQE std', 'noise'],
    ['IQE', 'ignored'],
    ['1-R (%)', 'ignored'],
    ['Bestrahlungsstärke', 'irradiance'],
  ])('%s heads a column of %s', (header, role) => expect(roleInHeader(header)?.role).toBe(role))

  it('says nothing of a word it does not know', () => expect(roleInHeader('Sample 4')).toBeNull())
})

describe('units in headers', () => {
  it.each([
    ['EQE (%)', { of: 'value', unit: 'percent' }],
    ['EQE [-]', { of: 'value', unit: 'fraction' }],
    ['SR / A W^-1', { of: 'value', unit: 'A/W' }],
    ['SR (mA/W)', { of: 'unknown', written: 'SR (mA/W)' }],
    ['E (W·m⁻²·nm⁻¹)', { of: 'value', unit: 'W/m2/nm' }],
    ['E [W/m^2/um]', { of: 'value', unit: 'W/m2/um' }],
    ['E (mW m-2 nm-1)', { of: 'unknown', written: 'E (mW m-2 nm-1)' }],
    ['λ (Å)', { of: 'wavelength', unit: 'angstrom' }],
    ['wavelength_nm', { of: 'wavelength', unit: 'nm' }],
    ['Top cell', null],
  ])('%s', (header, unit) => expect(unitInHeader(header)).toEqual(unit))
})

describe('wavelengths without a unit', () => {
  it.each([
    [[300, 1200], 'nm', false],
    [[0.3, 1.2], 'um', false],
    [[1.03, 4.13], 'eV', false],
    [[3000, 12_000], 'angstrom', false],
    [[1, 2.2], 'eV', true],
  ] as const)('%j is %s', (numbers, unit, isAmbiguous) =>
    expect(wavelengthUnitByRange(numbers)).toEqual({ unit, isAmbiguous }),
  )
})

it('zipEntries reads the directory of a workbook without unpacking it', () => {
  const entries = zipEntries(workbook([{ name: 'S', cells: [[1, 2]] }]), 'w.xlsx')
  expect(entries.map((entry) => entry.name)).toContain('xl/worksheets/sheet1.xml')
  expect(entries.every((entry) => entry.unpackedBytes > 0)).toBe(true)
})
