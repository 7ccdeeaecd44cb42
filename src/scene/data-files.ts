import { dirname, join, resolve } from 'node:path'
import { SceneError, type SceneProblem } from './error.js'
import { locateProblem } from './issue-problems.js'
import { largestDataFile } from './limits.js'
import { readText } from './read-text.js'
import { sha256 } from './sha256.js'
import type { InputFile, ScenePath } from './types.js'
import type { YamlDocument } from './yaml-document.js'

type ParseTable<Table> = (text: string, file: string, shownAs: string) => Table

/** Reads the data files that a scene names, relative to the scene's folder, and keeps what is wrong with them. */
export class DataFiles {
  readonly problems: SceneProblem[] = []
  /** Every file read, once. */
  readonly inputs: InputFile[] = []

  constructor(
    private readonly sceneFile: string,
    private readonly document: YamlDocument
  ) {}

  /** The table in a file named at a path of the scene; undefined, and a problem more, when it cannot be used. */
  read<Table>(name: string, path: ScenePath, parse: ParseTable<Table>): Table | undefined {
    const folder = dirname(this.sceneFile)
    const file = resolve(folder, name)
    const content = readText(file, largestDataFile)
    if ('reason' in content) {
      this.problems.push(locateProblem(this.document, path, `the file ${file} ${content.reason}`))
      return undefined
    }
    if (!this.inputs.some((input) => input.file === file)) this.inputs.push({ file, sha256: sha256(content.text) })
    try {
      return parse(content.text, file, resolve(name) === name ? name : join(folder, name))
    } catch (error) {
      if (!(error instanceof SceneError)) throw error
      this.problems.push(...error.problems)
      return undefined
    }
  }
}
