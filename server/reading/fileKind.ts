import { ReadingError } from './readingError.js'

const TEXT_EXPECTED = 'a text table (CSV, TSV, blank-separated) or an XLSX workbook'

/** Beginnings of files that people upload by mistake, and what they are called. */
const SIGNATURES: { bytes: number[]; name: string }[] = [
  { bytes: [0x89, 0x50, 0x4e, 0x47], name: 'a PNG picture' },
  { bytes: [0xff, 0xd8, 0xff], name: 'a JPEG picture' },
  { bytes: [0x47, 0x49, 0x46, 0x38], name: 'a GIF picture' },
  { bytes: [0x49, 0x49, 0x2a, 0x00], name: 'a TIFF picture' },
  { bytes: [0x4d, 0x4d, 0x00, 0x2a], name: 'a TIFF picture' },
  { bytes: [0x25, 0x50, 0x44, 0x46, 0x2d], name: 'a PDF document' },
  { bytes: [0xd0, 0xcf, 0x11, 0xe0], name: 'an old binary Office file (.xls or .doc); save it as XLSX or CSV first' },
  { bytes: [0x1f, 0x8b], name: 'a gzip archive; unpack it first' },
  { bytes: [0x37, 0x7a, 0xbc, 0xaf], name: 'a 7z archive; unpack it first' },
  { bytes: [0x52, 0x61, 0x72, 0x21], name: 'a RAR archive; unpack it first' },
  { bytes: [0x42, 0x5a, 0x68], name: 'a bzip2 archive; unpack it first' },
  { bytes: [0x89, 0x48, 0x44, 0x46], name: 'an HDF5 file' },
  { bytes: [0x7f, 0x45, 0x4c, 0x46], name: 'a program' },
]

const startsWith = (bytes: Uint8Array, signature: number[]) => signature.every((byte, i) => bytes[i] === byte)

export const isZip = (bytes: Uint8Array): boolean =>
  startsWith(bytes, [0x50, 0x4b, 0x03, 0x04]) || startsWith(bytes, [0x50, 0x4b, 0x05, 0x06])

/** Refuses what begins like a picture, a document or an archive, whatever its name says. */
export function refuseKnownBinary(bytes: Uint8Array, fileName: string): void {
  const known = SIGNATURES.find((signature) => startsWith(bytes, signature.bytes))
  if (known)
    throw new ReadingError('not-text', `${fileName} is no table of text but ${known.name}.`, {
      expected: TEXT_EXPECTED,
    })
}

export function notText(fileName: string): ReadingError {
  return new ReadingError('not-text', `${fileName} is a binary file, not a table of text.`, { expected: TEXT_EXPECTED })
}
