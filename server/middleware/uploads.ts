import type { Request, Response } from 'express'
import multer from 'multer'
import { basename } from 'node:path'
import { ApiError } from '../../shared/contract/errors.js'
import type { Config } from '../config.js'

export interface UploadedFile {
  name: string
  bytes: Buffer
}

/** All files of one request together may hold as much as this many of the largest. */
const LARGEST_FILES_AT_ONCE = 5
const NAME_LENGTH = 255
/** No table has one of these media types; what else a file is, the reader finds out from its bytes. */
const NO_TABLE = /^(image|audio|video|font)\//

/**
 * Takes in the parts named `files` of a multipart request, in memory, within the limits of the installation. To be
 * called once it is known that the sender may upload.
 */
export async function receiveFiles(request: Request, response: Response, config: Config): Promise<UploadedFile[]> {
  const limitBytes = LARGEST_FILES_AT_ONCE * config.uploadMaxBytes
  if (Number(request.get('Content-Length') ?? 0) > limitBytes)
    throw new ApiError(
      'BODY_TOO_LARGE',
      { limitBytes },
      `The files of one request may have ${megabytes(limitBytes)} together; send them one after the other.`,
    )
  const receive = multer({
    storage: multer.memoryStorage(),
    limits: { fileSize: config.uploadMaxBytes, files: config.uploadMaxFiles, fields: 10, fieldSize: 10_000 },
    defParamCharset: 'utf8',
    fileFilter: (_request, file, done) => {
      if (NO_TABLE.test(file.mimetype)) done(noTable(file.originalname, file.mimetype))
      else done(null, true)
    },
  }).array('files')
  await new Promise<void>((resolve, reject) => {
    void receive(request, response, (error: unknown) => (error ? reject(inWords(error, config)) : resolve()))
  })
  const files = (request.files ?? []) as Express.Multer.File[]
  if (files.length === 0) {
    const message = 'No file arrived. Send one or more files in parts named “files”.'
    throw new ApiError('INPUT_INVALID', { errors: [{ path: ['files'], message }] }, message)
  }
  return files.map((file) => ({ name: plainName(file.originalname), bytes: file.buffer }))
}

function inWords(error: unknown, config: Config): unknown {
  if (error instanceof ApiError) return error
  const code = error instanceof multer.MulterError ? error.code : null
  if (code === 'LIMIT_FILE_SIZE')
    return new ApiError(
      'BODY_TOO_LARGE',
      { limitBytes: config.uploadMaxBytes },
      `A file is larger than ${megabytes(config.uploadMaxBytes)}, the most this installation takes for one file.`,
    )
  const message =
    code === 'LIMIT_FILE_COUNT'
      ? `At most ${config.uploadMaxFiles} files can be sent at once.`
      : 'The upload cannot be taken apart. Send multipart/form-data with one or more parts named “files”.'
  return new ApiError('INPUT_INVALID', { errors: [{ path: ['files'], message }] }, message, { cause: error })
}

function noTable(fileName: string, mediaType: string): ApiError {
  const reason = `it is sent as ${mediaType}, which holds no table`
  return new ApiError(
    'FILE_UNREADABLE',
    { fileName, reason, value: mediaType, expected: 'text in columns (CSV, TSV, …) or an XLSX workbook' },
    `${fileName} cannot be read: ${reason}. Send text in columns (CSV, TSV, …) or an XLSX workbook.`,
  )
}

const megabytes = (bytes: number) => `${(bytes / 1e6).toFixed(bytes < 1e6 ? 3 : 0)} MB`

/** The last part of a path, without control characters; a file without a name gets one. */
function plainName(name: string): string {
  const plain = basename(name.replaceAll('\\', '/'))
    .replace(/\p{Cc}/gu, '')
    .trim()
  return (plain || 'file').slice(-NAME_LENGTH)
}
