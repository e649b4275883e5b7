import { READING_LIMITS } from './limits.js'
import { ReadingError } from './readingError.js'

export interface ZipEntry {
  name: string
  unpackedBytes: number
}

const END_SIGNATURE = 0x06054b50
const ENTRY_SIGNATURE = 0x02014b50
const LARGEST_COMMENT = 65_535

/**
 * Names and unpacked sizes from the directory at the end of a zip (PKWARE APPNOTE 4.3.12 and 4.3.16), without
 * unpacking anything. @throws ReadingError when the directory is missing or cut off.
 */
export function zipEntries(bytes: Uint8Array, fileName: string): ZipEntry[] {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const end = findEnd(view)
  if (end < 0) throw cutOff(fileName)
  const count = view.getUint16(end + 10, true)
  let at = view.getUint32(end + 16, true)
  const entries: ZipEntry[] = []
  for (let i = 0; i < count; i++) {
    if (at + 46 > bytes.length || view.getUint32(at, true) !== ENTRY_SIGNATURE) throw cutOff(fileName)
    const nameLength = view.getUint16(at + 28, true)
    entries.push({
      name: new TextDecoder().decode(bytes.subarray(at + 46, at + 46 + nameLength)),
      unpackedBytes: view.getUint32(at + 24, true),
    })
    at += 46 + nameLength + view.getUint16(at + 30, true) + view.getUint16(at + 32, true)
  }
  return entries
}

/**
 * Refuses a zip that is no workbook, or that says it would unpack to more than the limit. A directory that lies is
 * caught by the memory limit of the worker.
 */
export function checkWorkbookZip(bytes: Uint8Array, fileName: string): void {
  const entries = zipEntries(bytes, fileName)
  const total = entries.reduce((sum, entry) => sum + entry.unpackedBytes, 0)
  if (total > READING_LIMITS.unpackedBytes)
    throw new ReadingError(
      'too-large',
      `${fileName} would unpack to ${megabytes(total)} MB; a workbook of scans stays below ` +
        `${megabytes(READING_LIMITS.unpackedBytes)} MB.`,
      { expected: 'the sheet with the scan alone' },
    )
  if (!entries.some((entry) => entry.name.replaceAll('\\', '/').toLowerCase() === 'xl/workbook.xml'))
    throw new ReadingError('not-text', `${fileName} is a zip archive, but no XLSX workbook.`, {
      expected: 'the files themselves, or an XLSX workbook',
    })
}

export const damagedWorkbook = (fileName: string, why: string): ReadingError =>
  new ReadingError('damaged-workbook', `${fileName} is a damaged XLSX workbook: ${why}.`, {
    expected: 'the whole file, or the sheet saved as CSV',
  })

const cutOff = (fileName: string) =>
  damagedWorkbook(fileName, 'the directory of its zip is missing, as when a file was cut off while it was copied')

function findEnd(view: DataView): number {
  const last = view.byteLength - 22
  for (let at = last; at >= 0 && at >= last - LARGEST_COMMENT; at--)
    if (view.getUint32(at, true) === END_SIGNATURE) return at
  return -1
}

const megabytes = (bytes: number) => Math.round(bytes / 1e6)
