import { parseArgs } from 'node:util'
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

/** An option of a command; one without a default may be left out. */
export type OptionDescription =
  | { type: 'string'; default?: string }
  | { type: 'string'; multiple: true; default: string[] }
  | { type: 'boolean'; default?: boolean }

type ValueOf<Option> = Option extends { multiple: true }
  ? string[]
  : Option extends { type: 'string' }
    ? string
    : boolean
export type OptionValues<Options> = {
  [Name in keyof Options]: Options[Name] extends { default: unknown }
    ? ValueOf<Options[Name]>
    : ValueOf<Options[Name]> | undefined
}

/** Options and the one file that a command works on. @throws CommandError that names what was not understood. */
export function commandArguments<const Options extends Record<string, OptionDescription>>(
  usage: string,
  args: readonly string[],
  options: Options,
): { values: OptionValues<Options>; file: string } {
  try {
    const { values, positionals } = parseArgs({ args: [...args], options, allowPositionals: true, strict: true })
    if (positionals.length !== 1)
      throw new CommandError(`One file is wanted, ${positionals.length} were given. Usage: ${usage}`, 2)
    return { values: values as unknown as OptionValues<Options>, file: positionals[0]! }
  } catch (error) {
    if (error instanceof CommandError) throw error
    throw new CommandError(
      `${error instanceof Error ? error.message.split('\n')[0] : String(error)} Usage: ${usage}`,
      2,
    )
  }
}
