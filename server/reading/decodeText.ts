import { notText, refuseKnownBinary } from './fileKind.js'
import { ReadingError } from './readingError.js'

export interface DecodedText {
  text: string
  encoding: 'UTF-8' | 'UTF-16' | 'ISO-8859-1'
}

/**
 * Text of a file: UTF-8 with or without a mark, UTF-16 with a mark or recognisable zero bytes, and ISO-8859-1 (read as
 * its superset Windows-1252) for what is no UTF-8. @throws ReadingError for an empty or binary file.
 */
export function decodeText(bytes: Uint8Array, fileName: string): DecodedText {
  if (bytes.length === 0)
    throw new ReadingError('empty', `${fileName} is empty.`, { expected: 'a table with a column of wavelengths' })
  refuseKnownBinary(bytes, fileName)
  const decoded = decode(bytes)
  if (!looksLikeText(decoded.text)) throw notText(fileName)
  if (decoded.text.trim() === '')
    throw new ReadingError('empty', `${fileName} is empty: it holds nothing but blanks.`, {
      expected: 'a table with a column of wavelengths',
    })
  return decoded
}

function decode(bytes: Uint8Array): DecodedText {
  const wide = utf16Order(bytes)
  if (wide) return { text: new TextDecoder(wide).decode(bytes), encoding: 'UTF-16' }
  try {
    return { text: new TextDecoder('utf-8', { fatal: true }).decode(bytes), encoding: 'UTF-8' }
  } catch {
    return { text: new TextDecoder('windows-1252').decode(bytes), encoding: 'ISO-8859-1' }
  }
}

function utf16Order(bytes: Uint8Array): 'utf-16le' | 'utf-16be' | null {
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return 'utf-16le'
  if (bytes[0] === 0xfe && bytes[1] === 0xff) return 'utf-16be'
  const sample = bytes.subarray(0, 1000)
  if (sample.length < 8) return null
  const zeros = [0, 0]
  sample.forEach((byte, i) => {
    if (byte === 0) zeros[i % 2]! += 1
  })
  const [even, odd] = zeros as [number, number]
  if (odd > 0.4 * sample.length && even === 0) return 'utf-16le'
  if (even > 0.4 * sample.length && odd === 0) return 'utf-16be'
  return null
}

/** Text has tabs and line ends and hardly any other control characters. */
function looksLikeText(text: string): boolean {
  let strange = 0
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i)
    if (code === 0) return false
    const isBlank = (code >= 9 && code <= 13) || (code === 26 && i === text.length - 1)
    if ((code < 32 && !isBlank) || code === 0xfffd || (code >= 127 && code < 160)) strange++
  }
  return strange <= text.length * 0.005
}
