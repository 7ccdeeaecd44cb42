import { basename, dirname, extname, join, resolve } from 'node:path'
import { version } from '../../output/version.js'
import { DataFiles } from '../../scene/data-files.js'
import { SceneError } from '../../scene/error.js'
import { isRecord } from '../../scene/is-record.js'
import { issueProblems, locateProblem } from '../../scene/issue-problems.js'
import { largestSceneFile } from '../../scene/limits.js'
import { parseScene } from '../../scene/read.js'
import { readUserFile } from '../../scene/read-list-file.js'
import { readText } from '../../scene/read-text.js'
import { wording } from '../../scene/wording.js'
import { YamlDocument } from '../../scene/yaml-document.js'
import type { Sweep } from '../types.js'
import { checkModels } from './check-models.js'
import { readDataSets } from './data-sets.js'
import { planModels } from './plan-models.js'
import { planSchema } from './plan-schema.js'

/** Reads a plan and all it names. Throws a SceneError that lists what is wrong, in the plan, the scene or their data files. */
export function readPlan(file: string): Sweep {
  const text = readUserFile(file, 'plan file')
  const document = new YamlDocument(text, file)
  const result = planSchema.safeParse(document.value, { error: wording, reportInput: true })
  if (!result.success) throw new SceneError(issueProblems(result.error.issues, document))
  const written = result.data
  const base = readBase(written.scene, file, document)
  const seed = written.seed ?? base.scene.seed
  const files = new DataFiles(file, document)
  const data = readDataSets(written.data, base.value, document, files)
  const { locate, ...models } = planModels(written, base.value, seed, document, files)
  const { effort, spectra } = base.value
  const sweep: Sweep = {
    program: 'motelight',
    version,
    title: written.title ?? basename(file, extname(file)),
    plan: resolve(file),
    sceneFile: resolve(base.file),
    base: {
      ...base.value,
      ...(written.precision !== undefined && { effort: { ...(isRecord(effort) && effort), precision: written.precision } }),
      spectra: [...(Array.isArray(spectra) ? spectra : []), ...data.map(({ spectrum }) => spectrum)]
    },
    seed,
    inputs: base.scene.inputs.slice(1),
    ...models,
    data: data.map(({ set }) => set),
    slurm: written.slurm
  }
  checkModels(sweep, locate, document)
  return sweep
}

/** The base scene as written, and as read: it must be sound by itself. */
function readBase(name: string, plan: string, document: YamlDocument) {
  const file = resolve(name) === name ? name : join(dirname(plan), name)
  const content = readText(file, largestSceneFile)
  if ('reason' in content) throw new SceneError([locateProblem(document, ['scene'], `the scene file ${file} ${content.reason}`)])
  const scene = parseScene(content.text, file)
  return { file, scene, value: new YamlDocument(content.text, file).value as Record<string, unknown> }
}
