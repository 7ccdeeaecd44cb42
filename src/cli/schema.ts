import type { CommandModule } from 'yargs'
import { sceneJsonSchema } from '../scene/json-schema.js'

/** `motelight schema`: prints the JSON Schema of scene files. */
export const schema: CommandModule = {
  command: 'schema',
  describe: 'Print the JSON Schema of scene files, for completion in editors',
  handler: () => {
    process.stdout.write(`${JSON.stringify(sceneJsonSchema(), null, 2)}\n`)
  }
}
