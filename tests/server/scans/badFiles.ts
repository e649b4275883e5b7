import { constants, deflateRawSync } from 'node:zlib'
import * as XLSX from 'xlsx'

/** A file that no scan can be made of, and what its sentence has to say. */
export interface BadFile {
  title: string
  name: string
  bytes: Buffer
  sentence: RegExp
}

const text = (lines: string[], newline = '\n') => Buffer.from(lines.join(newline), 'utf8')
const rows = (count: number, row: (i: number) => string) => Array.from({ length: count }, (_, i) => row(i))
const good = (i: number) => `${300 + 10 * i},${(0.1 + 0.01 * i).toFixed(3)}`
const header = 'Wavelength (nm),EQE'

export const BAD_FILES: BadFile[] = [
  { title: 'an empty file', name: 'empty.csv', bytes: Buffer.alloc(0), sentence: /empty/i },
  {
    title: 'blank lines only',
    name: 'blank.csv',
    bytes: text(['', '  ', '\t', '']),
    sentence: /empty|blank|no table/i,
  },
  {
    title: 'prose',
    name: 'letter.txt',
    bytes: text(['Dear all,', 'the scans will follow tomorrow, after the lamp is changed.', 'Best wishes']),
    sentence: /table|numbers/i,
  },
  {
    title: 'a single column',
    name: 'single.csv',
    bytes: text(['EQE', ...rows(20, (i) => (0.1 + 0.01 * i).toFixed(3))]),
    sentence: /column/i,
  },
  {
    title: 'NaN among the values',
    name: 'nan.csv',
    bytes: text([header, ...rows(20, (i) => (i === 7 ? '370,NaN' : good(i)))]),
    sentence: /NaN/,
  },
  {
    title: 'an infinite value',
    name: 'infinite.csv',
    bytes: text([header, ...rows(20, (i) => (i === 7 ? '370,Infinity' : good(i)))]),
    sentence: /Inf/,
  },
  {
    title: 'a word among the values',
    name: 'word.csv',
    bytes: text([header, ...rows(20, (i) => (i === 9 ? '390,overload' : good(i)))]),
    sentence: /overload/,
  },
  {
    title: 'a wavelength that comes twice with another value',
    name: 'repeated.csv',
    bytes: text([header, ...rows(20, (i) => (i === 5 ? '340,0.5' : good(i)))]),
    sentence: /twice|repeat|same wavelength|more than once/i,
  },
  {
    title: 'mixed decimal marks',
    name: 'mixed.csv',
    bytes: text([
      'Wavelength (nm);EQE',
      ...rows(20, (i) => `${300 + 10 * i};${i % 2 === 0 ? `0,${100 + i}` : `0.${100 + i}`}`),
    ]),
    sentence: /decimal/i,
  },
  {
    title: 'negative wavelengths',
    name: 'negative.csv',
    bytes: text([header, ...rows(20, (i) => `${-300 - 10 * i},0.5`)]),
    sentence: /wavelength/i,
  },
  {
    title: 'a wavelength of zero',
    name: 'zero.csv',
    bytes: text([header, ...rows(20, (i) => (i === 0 ? '0,0.5' : good(i)))]),
    sentence: /wavelength/i,
  },
  { title: 'headers without data', name: 'headers.csv', bytes: text([header, 'nm,-']), sentence: /table|rows|data/i },
  { title: 'one row of data', name: 'row.csv', bytes: text([header, '500,0.8']), sentence: /row|points|table/i },
  {
    title: 'a truncated spreadsheet',
    name: 'truncated.xlsx',
    bytes: workbook([
      ['Wavelength (nm)', 'EQE'],
      ...rows(40, (i) => good(i)).map((r) => r.split(',').map(Number)),
    ]).subarray(0, 2000),
    sentence: /spreadsheet|xlsx|zip|damaged|cut/i,
  },
  {
    title: 'a spreadsheet that unpacks to a gigabyte',
    name: 'bomb.xlsx',
    bytes: gigabyteZip(),
    sentence: /unpack|large|size|MB/i,
  },
  {
    title: 'an empty spreadsheet',
    name: 'nothing.xlsx',
    bytes: workbook([[]]),
    sentence: /sheet|empty|table/i,
  },
  {
    title: 'a picture with the name of a table',
    name: 'picture.csv',
    bytes: Buffer.concat([
      Buffer.from([0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a, 0, 0, 0, 13, 0x49, 0x48, 0x44, 0x52]),
      pseudoRandomBytes(4000),
    ]),
    sentence: /picture|image|PNG|text/i,
  },
  {
    title: 'a PDF with the name of a spreadsheet',
    name: 'report.xlsx',
    bytes: Buffer.concat([Buffer.from('%PDF-1.7\n'), pseudoRandomBytes(4000)]),
    sentence: /PDF|spreadsheet|xlsx/i,
  },
  {
    title: 'five megabytes on one line',
    name: 'line.csv',
    bytes: Buffer.from('1,'.repeat(2_500_000)),
    sentence: /line|columns/i,
  },
  {
    title: 'binary noise',
    name: 'noise.txt',
    bytes: pseudoRandomBytes(20_000),
    sentence: /text|binary/i,
  },
  {
    title: 'wavelengths that go up and down',
    name: 'zigzag.csv',
    bytes: text([
      header,
      ...rows(20, (i) => `${i % 2 === 0 ? 300 + 10 * i : 900 - 10 * i},${(0.2 + 0.01 * i).toFixed(2)}`),
      ...rows(20, (i) => `${i % 2 === 0 ? 300 + 10 * i : 900 - 10 * i},${(0.5 + 0.01 * i).toFixed(2)}`),
    ]),
    sentence: /wavelength/i,
  },
]

function workbook(cells: unknown[][]): Buffer {
  const book = XLSX.utils.book_new()
  XLSX.utils.book_append_sheet(book, XLSX.utils.aoa_to_sheet(cells), 'Scan')
  return XLSX.write(book, { type: 'buffer', bookType: 'xlsx' }) as Buffer
}

/** A zip of one entry, a worksheet of 1 GiB of zeros squeezed to a megabyte; written by hand as PKWARE's note says. */
function gigabyteZip(): Buffer {
  const size = 1 << 30
  const zeros = Buffer.alloc(1 << 24)
  const piece = deflateRawSync(zeros, { level: 9, finishFlush: constants.Z_FULL_FLUSH })
  const last = deflateRawSync(zeros, { level: 9 })
  const squeezed = Buffer.concat([...Array.from({ length: size / zeros.length - 1 }, () => piece), last])
  const name = Buffer.from('xl/worksheets/sheet1.xml')
  const local = Buffer.alloc(30)
  local.writeUInt32LE(0x04034b50, 0)
  local.writeUInt16LE(20, 4)
  local.writeUInt16LE(8, 8)
  local.writeUInt32LE(squeezed.length, 18)
  local.writeUInt32LE(size, 22)
  local.writeUInt16LE(name.length, 26)
  const central = Buffer.alloc(46)
  central.writeUInt32LE(0x02014b50, 0)
  central.writeUInt16LE(20, 4)
  central.writeUInt16LE(20, 6)
  central.writeUInt16LE(8, 10)
  central.writeUInt32LE(squeezed.length, 20)
  central.writeUInt32LE(size, 24)
  central.writeUInt16LE(name.length, 28)
  const end = Buffer.alloc(22)
  end.writeUInt32LE(0x06054b50, 0)
  end.writeUInt16LE(1, 8)
  end.writeUInt16LE(1, 10)
  end.writeUInt32LE(central.length + name.length, 12)
  end.writeUInt32LE(local.length + name.length + squeezed.length, 16)
  return Buffer.concat([local, name, squeezed, central, name, end])
}

/** A linear congruential generator (Numerical Recipes' constants), so that the noise is the same in every run. */
function pseudoRandomBytes(length: number): Buffer {
  const bytes = Buffer.alloc(length)
  let state = 20261201
  for (let i = 0; i < length; i++) {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0
    bytes[i] = state >>> 24
  }
  return bytes
}
