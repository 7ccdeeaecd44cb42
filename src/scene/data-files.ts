import { dirname, join, resolve } from 'node:path'
import { DataError } from '../data/error.js'
import { readBytes } from '../data/read-bytes.js'
import { SceneError, type SceneProblem } from './error.js'
import { locateProblem } from './issue-problems.js'
import { largestDataFile, largestFieldFile } from './limits.js'
import { decodeText } from './read-text.js'
import { sha256 } from './sha256.js'
import type { InputFile, ScenePath } from './types.js'
import type { YamlDocument } from './yaml-document.js'

type Parse<Content, Table> = (content: Content, file: string, shownAs: string) => Table

/** Reads the data files that a scene names, relative to the scene's folder, and keeps what is wrong with them. */
export class DataFiles {
  readonly problems: SceneProblem[] = []
  /** Every file read, once. */
  readonly inputs: InputFile[] = []

  constructor(
    private readonly sceneFile: string,
    private readonly document: YamlDocument
  ) {}

  /** The table in a text file named at a path of the scene; undefined, and a problem more, when it cannot be used. */
  read<Table>(name: string, path: ScenePath, parse: Parse<string, Table>): Table | undefined {
    return this.readAny(name, path, largestDataFile, (bytes, file, shownAs) => {
      const content = decodeText(bytes)
      if ('text' in content) return parse(content.text, file, shownAs)
      throw new Unusable(content.reason)
    })
  }

  /** As `read`, from the bytes of a file that may be as large as a field of densities. */
  readField<Table>(name: string, path: ScenePath, parse: Parse<Uint8Array, Table>): Table | undefined {
    return this.readAny(name, path, largestFieldFile, parse)
  }

  private readAny<Table>(name: string, path: ScenePath, limit: number, parse: Parse<Uint8Array, Table>): Table | undefined {
    const folder = dirname(this.sceneFile)
    const file = resolve(folder, name)
    const refuse = (reason: string) => {
      this.problems.push(locateProblem(this.document, path, `the file ${file} ${reason}`))
      return undefined
    }
    const content = readBytes(file, limit)
    if ('reason' in content) return refuse(content.reason)
    const { bytes } = content
    if (!this.inputs.some((input) => input.file === file)) this.inputs.push({ file, sha256: sha256(bytes) })
    try {
      return parse(bytes, file, resolve(name) === name ? name : join(folder, name))
    } catch (error) {
      if (error instanceof Unusable) return refuse(error.message)
      if (error instanceof DataError) return refuse(error.reason)
      if (!(error instanceof SceneError)) throw error
      this.problems.push(...error.problems)
      return undefined
    }
  }
}

/** A file is not of the kind that is needed; the message completes "the file ...". */
class Unusable extends Error {}
