import type { Argv, CommandModule } from 'yargs'
import { dataJsonSchema } from '../compare/read-data.js'
import { instrumentJsonSchema } from '../observe/read-instrument.js'
import { sceneJsonSchema } from '../scene/json-schema.js'

const schemas = { scene: sceneJsonSchema, instrument: instrumentJsonSchema, data: dataJsonSchema }

interface Arguments {
  file: keyof typeof schemas
}

/** `motelight schema [FILE]`: prints the JSON Schema of scene files, instrument files or files of data. */
export const schema: CommandModule<object, Arguments> = {
  command: 'schema [file]',
  describe: 'Print the JSON Schema of scene files, instrument files or files of data, for completion in editors',
  builder: (yargs: Argv) =>
    yargs.positional('file', {
      describe: 'What kind of file',
      choices: Object.keys(schemas) as Arguments['file'][],
      default: 'scene'
    }) as Argv<Arguments>,
  handler: ({ file }) => {
    process.stdout.write(`${JSON.stringify(schemas[file](), null, 2)}\n`)
  }
}
