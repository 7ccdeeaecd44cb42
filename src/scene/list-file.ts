import { basename, extname } from 'node:path'
import type { z } from 'zod'
import { byPlace } from './by-place.js'
import { DataFiles } from './data-files.js'
import { SceneError, type SceneProblem } from './error.js'
import { issueProblems, locateProblem } from './issue-problems.js'
import { largestSceneFile } from './limits.js'
import { readText } from './read-text.js'
import { sha256 } from './sha256.js'
import type { InputFile, ScenePath } from './types.js'
import { wording } from './wording.js'
import { YamlDocument } from './yaml-document.js'

/** Text of a file that a user wrote; `what` it is. Throws a SceneError where it cannot be read. */
export function readUserFile(file: string, what: string): string {
  const content = readText(file, largestSceneFile)
  if ('reason' in content)
    throw new SceneError([{ location: { file, line: 1, column: 1 }, key: '', message: `the ${what} ${content.reason}` }])
  return content.text
}

/** A list of named entries: what each means, and every file that they name. */
interface List<Content, Spec> {
  content: Content
  specs: Spec[]
  inputs: InputFile[]
  problemAt: (path: ScenePath, message: string) => SceneProblem
}

/** A file that is such a list. */
export interface ListFile<Content, Spec> extends List<Content, Spec> {
  file: string
  text: string
  title: string
}

/** What an entry means, once the files that it names are read; undefined where one cannot be used. */
type SpecOf<Entry, Spec> = (entry: Entry, path: ScenePath, files: DataFiles) => Spec | undefined

/** The text of a YAML file whose `key` is a list of named entries. Throws a SceneError as `parseList`; the file is first of its inputs. */
export function parseListFile<
  Key extends string,
  Entry extends { name: string },
  Content extends { title?: string } & Record<Key, Entry[]>,
  Spec
>(text: string, file: string, schema: z.ZodType<Content>, key: Key, specOf: SpecOf<Entry, Spec>): ListFile<Content, Spec> {
  const document = new YamlDocument(text, file)
  const list = parseList(document.value, document, file, schema, key, specOf)
  const title = list.content.title ?? basename(file, extname(file))
  return { ...list, file, text, title, inputs: [{ file, sha256: sha256(text) }, ...list.inputs] }
}

/**
 * The list at a key of a value that stands in a document. Throws a SceneError that lists every problem found in it and in the files that
 * its entries name.
 */
export function parseList<Key extends string, Entry extends { name: string }, Content extends Record<Key, Entry[]>, Spec>(
  value: unknown,
  document: YamlDocument,
  file: string,
  schema: z.ZodType<Content>,
  key: Key,
  specOf: SpecOf<Entry, Spec>
): List<Content, Spec> {
  const result = schema.safeParse(value, { error: wording, reportInput: true })
  const files = new DataFiles(file, document)
  const problems = issueProblems(result.error?.issues ?? [], document)
  const entries: Entry[] = result.data?.[key] ?? []
  entries.forEach(({ name }, i) => {
    if (entries.findIndex((other) => other.name.toLowerCase() === name.toLowerCase()) < i)
      problems.push(locateProblem(document, [key, i, 'name'], 'the name is used twice; names must differ in more than capitals'))
  })
  const specs = entries.map((entry, i) => specOf(entry, [key, i], files))
  problems.push(...files.problems)
  if (!result.success || problems.length > 0) throw new SceneError(problems.sort(byPlace(file)))
  return {
    content: result.data,
    specs: specs.filter((spec) => spec !== undefined),
    inputs: files.inputs,
    problemAt: (path, message) => locateProblem(document, path, message)
  }
}
