import { analyse } from './analyse.js'
import { biasPlan } from './biasPlan.js'
import type { Command, Output } from './command.js'
import { CommandError } from './commandError.js'
import { reduce } from './reduce.js'
import { whatIf } from './whatIf.js'

/** Every command. A new one is one file and one line here. */
const COMMANDS: readonly Command[] = [analyse, biasPlan, reduce, whatIf]

/** Runs a command line; gives the exit code. */
export async function main(args: readonly string[], output: Output): Promise<number> {
  const [name, ...rest] = args
  if (name === undefined || name === '--help' || name === 'help') {
    output.out(overview())
    return name === undefined ? 2 : 0
  }
  try {
    const command = COMMANDS.find((one) => one.name === name)
    if (!command)
      throw new CommandError(
        `There is no command "${name}"; there are: ${COMMANDS.map((one) => one.name).join(', ')}.`,
        2,
      )
    if (rest.includes('--help')) output.out(`${command.usage}\n\n${command.description}\n`)
    else await command.run(rest, output)
    return 0
  } catch (error) {
    if (!(error instanceof CommandError)) throw error
    output.err(`${error.message}\n`)
    return error.exitCode
  }
}

function overview(): string {
  const rows = COMMANDS.map((one) => `  ${one.usage}\n      ${one.summary}`)
  return `Current matching of multi-junction cells without a browser.\n\n${rows.join('\n')}\n\nAdd --help to a command for more.\n`
}
