import type { ReadingErrorCode } from '../server/reading/readingError.js'
import { seededRandom } from '../shared/physics/numerics/random.js'
import { workbook } from './workbooks.js'
import { gridNm } from './writing.js'

/** A file that no scan can be made of, the reason that the reader gives, and the line that it names. */
export interface BadFile {
  name: string
  what: string
  bytes: Buffer
  code: ReadingErrorCode
  line?: number
}

const HEADER = 'Wavelength (nm),EQE'
const GRID = gridNm(300, 700, 10)
const eqe = (i: number) => (0.4 + 0.01 * i).toFixed(3)
const text = (lines: readonly string[]) => Buffer.from([...lines, ''].join('\n'), 'utf8')
const good = (i: number) => `${GRID[i]},${eqe(i)}`
/** The rows of a good scan with one of them changed; row 0 stands in line 2. */
const scan = (change: (i: number) => string | null = () => null) =>
  text([HEADER, ...GRID.map((_, i) => change(i) ?? good(i))])
const at = (row: number, line: string) => (i: number) => (i === row ? line : null)

export function badFiles(): BadFile[] {
  return [...notATable(), ...badNumbers(), ...badWavelengths(), ...badWorkbooks()]
}

function notATable(): BadFile[] {
  const random = seededRandom(41)
  const noise = Buffer.from(Array.from({ length: 3000 }, () => random.below(256)))
  const png = Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13, 0x49, 0x48, 0x44, 0x52])
  return [
    { name: 'empty.csv', what: 'no bytes', bytes: Buffer.alloc(0), code: 'empty' },
    { name: 'blanks.csv', what: 'blank lines only', bytes: text(['', '  ', '\t']), code: 'empty' },
    {
      name: 'letter.txt',
      what: 'text only',
      bytes: text(['Dear all,', 'the scans follow tomorrow.']),
      code: 'no-table',
    },
    { name: 'headers-only.csv', what: 'headers without numbers', bytes: text([HEADER, 'nm,-']), code: 'no-table' },
    {
      name: 'one-column.csv',
      what: 'a single column',
      bytes: text(['EQE', ...GRID.map((_, i) => eqe(i))]),
      code: 'one-column',
    },
    { name: 'one-row.csv', what: 'a single row', bytes: text([HEADER, '500,0.8']), code: 'too-few-rows', line: 2 },
    { name: 'picture.csv', what: 'a renamed PNG', bytes: Buffer.concat([png, noise]), code: 'not-text' },
    {
      name: 'report.csv',
      what: 'a renamed PDF',
      bytes: Buffer.concat([Buffer.from('%PDF-1.7\n'), noise]),
      code: 'not-text',
    },
    { name: 'noise.dat', what: 'binary noise', bytes: noise, code: 'not-text' },
    {
      name: 'raw-signals.txt',
      what: 'lock-in X and Y without an EQE',
      bytes: text(['Wavelength (nm)\tX (V)\tY (V)', ...GRID.map((nm) => `${nm}\t1.2e-3\t2e-4`)]),
      code: 'raw-signals-only',
      line: 2,
    },
  ]
}

function badNumbers(): BadFile[] {
  return [
    { name: 'nan.csv', what: 'NaN in a row', bytes: scan(at(7, '370,NaN')), code: 'not-a-number', line: 9 },
    { name: 'infinity.csv', what: 'an infinite value', bytes: scan(at(4, '340,Inf')), code: 'not-a-number', line: 6 },
    {
      name: 'overload.csv',
      what: 'a word in a row',
      bytes: scan(at(0, '300,overload')),
      code: 'not-a-number',
      line: 2,
    },
    { name: 'hole.csv', what: 'a missing value', bytes: scan(at(9, '390,')), code: 'missing-value', line: 11 },
    {
      name: 'mixed-decimal-marks.csv',
      what: 'points and commas',
      bytes: text([
        'Wavelength (nm);EQE',
        ...GRID.map((nm, i) => `${nm};${i === 5 ? eqe(i).replace('.', ',') : eqe(i)}`),
      ]),
      code: 'mixed-decimal-marks',
      line: 7,
    },
    {
      name: 'comma-in-two-roles.csv',
      what: 'the comma between columns and in the numbers',
      bytes: text([HEADER, ...GRID.map((nm, i) => `${nm},0,${40 + i}`)]),
      code: 'mixed-separators',
      line: 2,
    },
    {
      name: 'thousands.csv',
      what: 'marks for thousands',
      bytes: text(['Wavelength (nm);EQE (%)', ...GRID.map((nm, i) => `${nm};1.0${10 + i},5`)]),
      code: 'mixed-decimal-marks',
      line: 2,
    },
    {
      name: 'unknown-unit.csv',
      what: 'a responsivity in mA/W',
      bytes: text(['Wavelength (nm),Responsivity (mA/W)', ...GRID.map((nm, i) => `${nm},${100 + i}`)]),
      code: 'unknown-unit',
      line: 2,
    },
  ]
}

function badWavelengths(): BadFile[] {
  return [
    {
      name: 'repeated.csv',
      what: 'a wavelength twice',
      bytes: scan(at(5, '340,0.5')),
      code: 'repeated-wavelength',
      line: 7,
    },
    {
      name: 'unsorted.csv',
      what: 'wavelengths that go up and down',
      bytes: scan(at(5, '515.5,0.5')),
      code: 'unsorted-wavelength',
      line: 8,
    },
    {
      name: 'negative.csv',
      what: 'negative wavelengths',
      bytes: text([HEADER, ...GRID.map((nm, i) => `-${nm},${eqe(i)}`)]),
      code: 'wavelength-not-positive',
      line: 2,
    },
    {
      name: 'zero.csv',
      what: 'a wavelength of zero',
      bytes: scan(at(0, '0,0.4')),
      code: 'wavelength-not-positive',
      line: 2,
    },
    {
      name: 'wrong-unit.csv',
      what: 'micrometres headed as nm',
      bytes: text([HEADER, ...GRID.map((nm, i) => `${(nm / 1000).toFixed(2)},${eqe(i)}`)]),
      code: 'wavelength-range',
      line: 2,
    },
    {
      name: 'no-wavelengths.csv',
      what: 'two columns of values and no wavelengths',
      bytes: text(['EQE top,EQE bottom', ...GRID.map((_, i) => `${eqe(i)},${eqe(GRID.length - i)}`)]),
      code: 'no-wavelength',
      line: 2,
    },
  ]
}

function badWorkbooks(): BadFile[] {
  const whole = workbook([
    { name: 'Scan', cells: [['Wavelength (nm)', 'EQE'], ...GRID.map((nm, i) => [nm, Number(eqe(i))])] },
  ])
  return [
    {
      name: 'truncated.xlsx',
      what: 'a workbook cut off',
      bytes: whole.subarray(0, whole.length >> 1),
      code: 'damaged-workbook',
    },
    {
      name: 'empty.xlsx',
      what: 'a workbook without a cell',
      bytes: workbook([{ name: 'Sheet1', cells: [[]] }]),
      code: 'empty',
    },
    {
      name: 'archive.xlsx',
      what: 'a zip that is no workbook',
      bytes: Buffer.concat([Buffer.from('PK\x05\x06', 'latin1'), Buffer.alloc(18)]),
      code: 'not-text',
    },
  ]
}
