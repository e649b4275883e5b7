import { parseArgs, type ParseArgsConfig } from 'node:util'
import { CommandError } from './commandError.js'

export interface Output {
  out(text: string): void
  err(text: string): void
}

export interface Command {
  name: string
  usage: string
  summary: string
  description: string
  run(args: readonly string[], output: Output): Promise<void>
}

/** Options and the one file that a command works on. @throws CommandError that names what was not understood. */
export function commandArguments<Options extends NonNullable<ParseArgsConfig['options']>>(
  usage: string,
  args: readonly string[],
  options: Options,
) {
  try {
    const { values, positionals } = parseArgs({ args: [...args], options, allowPositionals: true, strict: true })
    if (positionals.length !== 1)
      throw new CommandError(`One file is wanted, ${positionals.length} were given. Usage: ${usage}`, 2)
    return { values, file: positionals[0]! }
  } catch (error) {
    if (error instanceof CommandError) throw error
    throw new CommandError(
      `${error instanceof Error ? error.message.split('\n')[0] : String(error)} Usage: ${usage}`,
      2,
    )
  }
}
