import type { ValueTransformer } from 'typeorm'
import type { z } from 'zod'

/** Curves are stored as little-endian Float64, 8 bytes a value, whatever the machine's own order. */
export const float64Blob: ValueTransformer = {
  to: (values: Float64Array | null | undefined) => (values ? encodeFloat64(values) : values),
  from: (bytes: Buffer | null) => (bytes ? decodeFloat64(bytes) : null),
}

export function encodeFloat64(values: Float64Array): Buffer {
  const bytes = Buffer.alloc(values.length * 8)
  values.forEach((value, i) => bytes.writeDoubleLE(value, i * 8))
  return bytes
}

/** @throws RangeError when the length is no multiple of eight: the column holds something else. */
export function decodeFloat64(bytes: Buffer): Float64Array {
  if (bytes.length % 8 !== 0) throw new RangeError(`A curve of ${bytes.length} bytes is not made of Float64 values.`)
  return Float64Array.from({ length: bytes.length / 8 }, (_, i) => bytes.readDoubleLE(i * 8))
}

/** JSON text; MariaDB's own json type is an alias of longtext. */
export function jsonColumn<Value>(): ValueTransformer {
  return {
    to: (value: Value | null | undefined) => (value === null || value === undefined ? value : JSON.stringify(value)),
    from: (text: string | null) => (text === null ? null : (JSON.parse(text) as Value)),
  }
}

/** JSON text that may be older than its schema: fields that were not there when it was written get their defaults. */
export function parsedJsonColumn<Schema extends z.ZodType>(schema: Schema): ValueTransformer {
  return {
    to: (value: z.output<Schema> | null | undefined) =>
      value === null || value === undefined ? value : JSON.stringify(value),
    from: (text: string | null) => (text === null ? null : schema.parse(JSON.parse(text))),
  }
}

/** BIGINT arrives as text; sizes and counts fit a number. */
export const bigintNumber: ValueTransformer = {
  to: (value: number | null | undefined) => value,
  from: (text: string | null) => (text === null ? null : Number(text)),
}
