import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { ReadingError } from '../../server/reading/readingError.js'
import { readMeasurementFile } from '../../server/reading/readMeasurementFile.js'
import type { ReadingOptions } from '../../server/reading/readingResult.js'
import { shortCircuitCurrentDensity } from '../../shared/physics/currents.js'
import { referenceSpectrum } from '../../shared/physics/spectrum.js'
import { workbook } from '../../examples/workbooks.js'

const read = (lines: readonly string[] | string, name = 'scan.csv', options?: ReadingOptions) =>
  readMeasurementFile(Buffer.from(typeof lines === 'string' ? lines : lines.join('\n')), name, options)

const problem = (run: () => unknown): ReadingError => {
  try {
    run()
  } catch (error) {
    if (error instanceof ReadingError) return error
    throw error
  }
  throw new Error('The file was read.')
}

describe('what a table is taken for', () => {
  it('headers tell roles, units and labels', () => {
    const { mapping, scans } = read([
      'Wavelength (nm);EQE Top (%);u(EQE) Top (%);Reflectance (%);Jsc integrated (mA/cm2);Temperature (K)',
      '300;10,5;0,1;12;0,1;298',
      '310;20,5;0,2;11;0,2;298',
    ])
    expect(mapping).toEqual({
      sheet: null,
      tableIndex: 0,
      wavelength: { column: 0, unit: 'nm' },
      series: [
        { column: 1, quantity: 'eqe', unit: 'percent', label: 'EQE Top' },
        { column: 2, quantity: 'noise', unit: 'percent', label: 'u Top' },
        { column: 3, quantity: 'reflectance', unit: 'percent', label: 'Reflectance' },
      ],
    })
    expect(scans.map((scan) => scan.quantity)).toEqual(['eqe', 'reflectance'])
    expect([...scans[0]!.values]).toEqual([0.105, 0.205])
    expect([...scans[0]!.noise!]).toEqual([0.001, 0.002])
    expect(scans[1]!.noise).toBeUndefined()
  })

  it('lock-in columns beside an EQE are told apart from it', () => {
    const { tables, scans } = read([
      'Wavelength (nm),X (V),Y (V),Phase (deg),Monitor (V),Dark (V),EQE',
      '300,1e-5,1e-6,5,1,1e-9,0.1',
      '310,2e-5,2e-6,5,1,1e-9,0.2',
    ])
    expect(tables[0]!.columns.map((column) => column.role)).toEqual([
      'wavelength',
      'signal-x',
      'signal-y',
      'phase',
      'monitor',
      'dark',
      'eqe',
    ])
    expect(scans).toHaveLength(1)
  })

  it.each([
    ['Wavelength (nm),Irradiance (W m-2 nm-1)', 'W/m2/nm', 1.2],
    ['Wavelength (nm),E (W/(m²·µm))', 'W/m2/um', 0.0012],
    ['Wavelength (nm),Spectral irradiance [µW cm⁻² nm⁻¹]', 'uW/cm2/nm', 0.012],
  ])('%s is a spectrum in %s', (header, unit, expected) => {
    const { mapping, scans } = read([header, '500,1.2', '510,1.3'])
    expect(mapping.series[0]).toMatchObject({ quantity: 'irradiance', unit })
    expect(scans[0]!.values[0]).toBeCloseTo(expected, 12)
  })

  it('the name of the file tells the quantity where no header does', () => {
    expect(read(['300 5', '310 6', '320 7'], 'reflectance.txt').scans[0]!.quantity).toBe('reflectance')
    expect(read(['300 5', '310 6', '320 7'], 'scan.txt').scans[0]!.quantity).toBe('eqe')
    expect(read(['300 5', '310 6'], 'scan.txt', { expected: 'irradiance' }).scans[0]!.quantity).toBe('irradiance')
  })

  it('columns headed by thicknesses are a split of one quantity', () => {
    const { scans } = read(['Wavelength;420;480;540', '300;0,1;0,2;0,3', '310;0,2;0,3;0,4'])
    expect(scans.map((scan) => scan.label)).toEqual(['420', '480', '540'])
    expect(scans[2]!.values[1]).toBe(0.4)
  })

  it('names of devices two lines above tables side by side become their titles', () => {
    const { tables } = read([
      'Sample A;;;Sample B;',
      'measured at night',
      'nm;EQE;;nm;EQE',
      '300;0,1;;400;0,3',
      '310;0,2;;410;0,4',
      ';;;420;0,5',
    ])
    expect(
      tables.map(({ title, rowCount, firstLine, lastLine }) => ({ title, rowCount, firstLine, lastLine })),
    ).toEqual([
      { title: 'Sample A', rowCount: 2, firstLine: 4, lastLine: 5 },
      { title: 'Sample B', rowCount: 3, firstLine: 4, lastLine: 6 },
    ])
  })

  it('empty cells are left out, with a note, where columns share their wavelengths', () => {
    const { scans, notes } = read(['nm,Top,Bottom', '300,0.1,', '310,0.2,0.1', '320,,0.2'])
    expect([...scans[1]!.wavelengthNm]).toEqual([310, 320])
    expect(notes).toContain('Column “Top” has 1 empty cells; they were left out.')
  })

  it('cells that a workbook shows as percentages are fractions, whatever the header says', () => {
    const cells = [
      ['Wavelength (nm)', 'EQE (%)'],
      [300, 0.5],
      [310, 0.6],
    ]
    const bytes = workbook([{ name: 'S', cells, format: { fromRow: 1, fromColumn: 1, code: '0.0%' } }])
    expect([...readMeasurementFile(bytes, 'w.xlsx').scans[0]!.values]).toEqual([0.5, 0.6])
  })
})

describe('what is ambiguous is said', () => {
  it('a column in percent that never reaches 1.5', () => {
    expect(read(['nm,EQE (%)', '300,0.4', '310,0.9']).notes.join()).toMatch(
      /Ambiguous: “EQE \(%\)” is headed in percent/,
    )
  })

  it('a fraction above one without a unit', () => {
    expect(read(['nm,EQE', '300,0.4', '310,1.2']).notes.join()).toMatch(/Ambiguous: no unit is given for “EQE”/)
  })

  it('a person’s unit that makes nonsense', () => {
    const { mapping } = read(['nm,EQE', '300,40', '310,80'])
    const series = mapping.series.map((one) => ({ ...one, unit: 'fraction' as const }))
    const given = read(['nm,EQE', '300,40', '310,80'], 'scan.csv', { mapping: { ...mapping, series } })
    expect(given.mappingOrigin).toBe('given')
    expect(given.notes).toEqual(['As read, “EQE” reaches 8000 %; its unit may be percent, or A/W, and not a fraction.'])
  })

  it('two scans one after the other are two tables, and the note names their lines', () => {
    const scan = [300, 310, 320, 330, 340].map((nm) => `${nm},0.${nm}`)
    const { tables, appendedTables, notes, scans } = read(['nm,EQE', ...scan, ...scan])
    expect(tables.map((table) => [table.firstLine, table.lastLine])).toEqual([
      [2, 6],
      [7, 11],
    ])
    expect(appendedTables).toEqual([1])
    expect(scans[0]!.wavelengthNm).toHaveLength(5)
    expect(notes.join()).toContain('2 scans one after the other, every wavelength 2 times. The first (lines 2 to 6)')
  })
})

describe('errors', () => {
  it('keep the tables, so that a person can correct the mapping', () => {
    const error = problem(() => read(['nm,Note', '300,abc', '310,def', '320,ghi']))
    expect(['no-values', 'no-table', 'one-column']).toContain(error.code)
    const raw = problem(() => read(['Wavelength (nm),X,Y', '300,1,2', '310,1,2']))
    expect(raw.details.tables?.[0]?.columns.map((column) => column.header)).toEqual(['Wavelength (nm)', 'X', 'Y'])
  })

  it('a mapping for another file says which column is missing', () => {
    const { mapping } = read(['nm,a,EQE', '300,1,0.1', '310,1,0.2'])
    const error = problem(() => read(['nm,EQE', '300,0.1', '310,0.2'], 'scan.csv', { mapping }))
    expect(error).toMatchObject({ code: 'mapping-mismatch' })
    expect(error.message).toContain('column C')
  })

  it('five megabytes on one line are refused by their length', () => {
    const error = problem(() => read('1,'.repeat(2_500_000)))
    expect(error).toMatchObject({ code: 'line-too-long', problem: { line: 1 } })
  })
})

describe('the shape of a file', () => {
  const shape = (lines: string[]) => read(lines).shape

  it('is the same for other numbers under the same headers, another for other headers', () => {
    const one = shape(['Wavelength (nm),EQE', '300,0.1', '310,0.2'])
    expect(shape(['Wavelength (nm),EQE', '400,0.4', '420,0.5', '440,0.4'])).toBe(one)
    expect(shape(['Wavelength (nm),EQE,Reflectance', '300,0.1,0.1', '310,0.2,0.1'])).not.toBe(one)
  })

  it('tells percent from fraction where the header does not', () => {
    expect(shape(['nm,EQE', '300,0.1', '310,0.2'])).not.toBe(shape(['nm,EQE', '300,10', '310,20']))
  })
})

describe('a current depends neither on the order of the rows nor on the units', () => {
  const spectrum = referenceSpectrum('AM1.5G')
  const current = (lines: string[]) => {
    const { wavelengthNm, values } = read(lines).scans[0]!
    return shortCircuitCurrentDensity({ wavelengthNm, values }, spectrum)
  }
  /** Scans on a grid of 20 nm, values in thousandths, so that a power of ten in the unit loses nothing. */
  const scans = fc.array(fc.integer({ min: 1, max: 999 }), { minLength: 6, maxLength: 40 })

  it('rows reversed, µm, Å, percent: within 1e-12', () => {
    fc.assert(
      fc.property(scans, (thousandths) => {
        const rows = thousandths.map((value, i) => [300 + 20 * i, value] as const)
        const nm = rows.map(([x, y]) => `${x},${y / 1000}`)
        const expected = current(['Wavelength (nm),EQE (fraction)', ...nm])
        const others = [
          ['Wavelength (nm),EQE (fraction)', ...[...nm].reverse()],
          ['Wavelength (µm),EQE (fraction)', ...rows.map(([x, y]) => `${(x / 1000).toFixed(3)},${y / 1000}`)],
          ['Wavelength (Å),EQE (fraction)', ...rows.map(([x, y]) => `${10 * x},${y / 1000}`)],
          ['Wavelength (nm),EQE (%)', ...rows.map(([x, y]) => `${x},${(y / 10).toFixed(1)}`)],
        ]
        for (const lines of others) expect(Math.abs(current(lines) / expected - 1)).toBeLessThan(1e-12)
      }),
      { seed: 11, numRuns: 60 },
    )
  })

  it('eV and A/W written in full precision: within 1e-12', () => {
    fc.assert(
      fc.property(scans, (thousandths) => {
        const hcOverQ = 1239.8419843320025
        const rows = thousandths.map((value, i) => [300 + 20 * i, value / 1000] as const)
        const expected = current(['Wavelength (nm),EQE (fraction)', ...rows.map(([x, y]) => `${x},${y}`)])
        const energies = rows.map(([x, y]) => `${hcOverQ / x},${y}`)
        const responsivities = rows.map(([x, y]) => `${x},${(y * x) / hcOverQ}`)
        expect(Math.abs(current(['Energy (eV),EQE (fraction)', ...energies]) / expected - 1)).toBeLessThan(1e-12)
        expect(Math.abs(current(['nm,SR (A/W)', ...responsivities]) / expected - 1)).toBeLessThan(1e-12)
      }),
      { seed: 12, numRuns: 60 },
    )
  })
})
