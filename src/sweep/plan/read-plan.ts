import { basename, extname, resolve } from 'node:path'
import { version } from '../../output/version.js'
import { DataFiles } from '../../scene/data-files.js'
import { SceneError } from '../../scene/error.js'
import { isRecord } from '../../scene/is-record.js'
import { issueProblems } from '../../scene/issue-problems.js'
import { readUserFile } from '../../scene/list-file.js'
import { parseScene } from '../../scene/read.js'
import { wording } from '../../scene/wording.js'
import { YamlDocument } from '../../scene/yaml-document.js'
import type { Sweep } from '../types.js'
import { checkModels } from './check-models.js'
import { modelScene } from './model-scene.js'
import { readPlanData } from './plan-data.js'
import { readPlanInstrument } from './plan-instrument.js'
import { planModels } from './plan-models.js'
import { planSchema } from './plan-schema.js'
import { readNamed } from './read-named.js'

/** Reads a plan and all it names. Throws a SceneError that lists what is wrong, in the plan, the scene or their data files. */
export function readPlan(file: string): Sweep {
  const text = readUserFile(file, 'plan file')
  const document = new YamlDocument(text, file)
  const result = planSchema.safeParse(document.value, { error: wording, reportInput: true })
  if (!result.success) throw new SceneError(issueProblems(result.error.issues, document))
  const written = result.data
  const base = readBase(written.scene, file, document)
  const seed = written.seed ?? base.scene.seed
  const { locate, ...models } = planModels(written, base.value, seed, document, new DataFiles(file, document))
  const { effort } = base.value
  const data = written.data === undefined ? undefined : readPlanData(written.data, file, document, base.scene)
  const instrument = written.observe === undefined ? undefined : readPlanInstrument(written.observe, file, document)
  const sweep: Sweep = {
    program: 'motelight',
    version,
    title: written.title ?? basename(file, extname(file)),
    plan: resolve(file),
    sceneFile: resolve(base.file),
    base: {
      ...base.value,
      ...(written.precision !== undefined && { effort: { ...(isRecord(effort) && effort), precision: written.precision } })
    },
    seed,
    inputs: base.scene.inputs.slice(1),
    ...models,
    ...(data && { data: data.data }),
    dataSpectra: data?.dataSpectra ?? [],
    ...(instrument && { instrument: instrument.instrument }),
    slurm: written.slurm
  }
  checkModels(sweep, locate, document)
  for (const part of [data, instrument]) part?.check(modelScene(sweep, 1))
  return sweep
}

/** The base scene as written, and as read: it must be sound by itself. */
function readBase(name: string, plan: string, document: YamlDocument) {
  const { file, text } = readNamed(name, 'scene file', ['scene'], plan, document)
  return { file, scene: parseScene(text, file), value: new YamlDocument(text, file).value as Record<string, unknown> }
}
