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

/** A file that is a list of named entries. */
export interface ListFile<Content, Spec> {
  file: string
  text: string
  title: string
  content: Content
  specs: Spec[]
  inputs: InputFile[]
  problemAt: (path: ScenePath, message: string) => SceneProblem
}

/**
 * Reads a YAML file whose `key` is a list of entries with names, each turned into what it means by `specOf`, which reads the files it
 * names and gives undefined where one cannot be used. Throws a SceneError that lists every problem found in all of them.
 */
export function readListFile<
  Key extends string,
  Entry extends { name: string },
  Content extends { title?: string } & Record<Key, Entry[]>,
  Spec
>(
  file: string,
  what: string,
  schema: z.ZodType<Content>,
  key: Key,
  specOf: (entry: Entry, path: ScenePath, files: DataFiles) => Spec | undefined
): ListFile<Content, Spec> {
  const text = readUserFile(file, what)
  const document = new YamlDocument(text, file)
  const result = schema.safeParse(document.value, { error: wording, reportInput: true })
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
    file,
    text,
    title: result.data.title ?? basename(file, extname(file)),
    content: result.data,
    specs: specs.filter((spec) => spec !== undefined),
    inputs: [{ file, sha256: sha256(text) }, ...files.inputs],
    problemAt: (path, message) => locateProblem(document, path, message)
  }
}
