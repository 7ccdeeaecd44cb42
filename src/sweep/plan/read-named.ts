import { dirname, join, resolve } from 'node:path'
import { SceneError } from '../../scene/error.js'
import { locateProblem } from '../../scene/issue-problems.js'
import { largestSceneFile } from '../../scene/limits.js'
import { readText } from '../../scene/read-text.js'
import type { ScenePath } from '../../scene/types.js'
import type { YamlDocument } from '../../scene/yaml-document.js'

/** A file that a plan names at a path, relative to the folder of the plan, and its text. Throws a SceneError. */
export function readNamed(name: string, what: string, path: ScenePath, plan: string, document: YamlDocument) {
  const file = resolve(name) === name ? name : join(dirname(plan), name)
  const content = readText(file, largestSceneFile)
  if ('reason' in content) throw new SceneError([locateProblem(document, path, `the ${what} ${file} ${content.reason}`)])
  return { file, text: content.text }
}
