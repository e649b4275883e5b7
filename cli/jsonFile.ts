import { readFile } from 'node:fs/promises'
import type { z } from 'zod'
import { CommandError } from './commandError.js'

/** Reads a JSON file by its schema. @throws CommandError: one sentence with the file, the place and the reason. */
export async function readJsonFile<Schema extends z.ZodType>(path: string, schema: Schema): Promise<z.output<Schema>> {
  const text = await readFile(path, 'utf8').catch((error: NodeJS.ErrnoException) => {
    throw new CommandError(
      error.code === 'ENOENT'
        ? `${path}: there is no such file.`
        : `${path} cannot be opened (${error.code ?? error.message}).`,
    )
  })
  const parsed = schema.safeParse(parseJson(path, text))
  if (parsed.success) return parsed.data
  const issue = parsed.error.issues[0]!
  const place = issue.path.length > 0 ? `at ${issue.path.join('.')}: ` : ''
  throw new CommandError(`${path}, ${place}${issue.message}`)
}

/** JSON with the line of a mistake, which Node gives as a position or in words. */
function parseJson(path: string, text: string): unknown {
  try {
    return JSON.parse(text)
  } catch (error) {
    const words = error instanceof Error ? error.message : String(error)
    const position = /position (\d+)/.exec(words)?.[1]
    const line = position === undefined ? text.split('\n').length : text.slice(0, Number(position)).split('\n').length
    throw new CommandError(
      `${path}, line ${line}: this is not valid JSON (${words.replace(/ in JSON at position.*$/, '')}).`,
    )
  }
}
