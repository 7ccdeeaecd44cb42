#!/usr/bin/env node
import yargs, { type CommandModule } from 'yargs'
import { hideBin } from 'yargs/helpers'
import { version } from '../output/version.js'
import { failureOf, reportFailure, UsageError } from './failure.js'

// A reader such as `head` that closes our output early is no error.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code === 'EPIPE') process.exit()
  throw error
})

/** What a command without enough words lacks. */
function missingWords(command: string): string {
  if (command === 'convert') return 'The value to convert is'
  if (command === 'sweep') return 'The plan file is'
  if (command === 'report') return 'The folder is'
  if (command === 'compare') return 'The run or the file of data is'
  return command === 'observe' ? 'The run or the instrument file is' : 'The scene file is'
}

/** Every command by its name, loaded when needed: together they take longer to load than `convert` to run. */
const modules = {
  check: async () => (await import('./check.js')).check,
  run: async () => (await import('./run.js')).run,
  join: async () => (await import('./join.js')).join,
  opacity: async () => (await import('./opacity.js')).opacity,
  convert: async () => (await import('./convert.js')).convert,
  observe: async () => (await import('./observe.js')).observe,
  compare: async () => (await import('./compare.js')).compare,
  report: async () => (await import('./report.js')).report,
  sweep: async () => (await import('./sweep.js')).sweep,
  schema: async () => (await import('./schema.js')).schema
}
const names = Object.keys(modules) as (keyof typeof modules)[]

const words = hideBin(process.argv)
try {
  const asked = names.filter((name) => name === words[0])
  const commands = await Promise.all((asked.length > 0 ? asked : names).map((name) => modules[name]()))
  await yargs(words)
    .scriptName('motelight')
    .usage('$0 <command>\n\nImages and spectra of dusty sources from a scene file.')
    .command(commands as CommandModule[])
    .demandCommand(1, `Which command? There are ${names.slice(0, -1).join(', ')} and ${names.at(-1)}.`)
    .strict()
    .version(version)
    .help()
    .locale('en')
    .parserConfiguration({ 'duplicate-arguments-array': false, 'boolean-negation': false })
    .wrap(Math.min(100, process.stdout.columns ?? 100))
    .epilogue(
      'Exit codes: 0 done, 2 the scene or the command line is wrong, 3 stopped early, 4 done but the precision asked for was not reached.'
    )
    .exitProcess(false)
    .fail((message, error) => {
      if (error && error.name !== 'YError') throw error
      throw new UsageError(
        message?.startsWith('Not enough non-option arguments') ? `${missingWords(words[0])} missing.` : (message ?? error.message)
      )
    })
    .parseAsync()
} catch (error) {
  reportFailure(failureOf(error), words.includes('--json'))
}
