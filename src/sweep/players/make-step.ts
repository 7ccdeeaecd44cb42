import { joinInFolder, runInFolder } from '../../run/run-in-folder.js'
import type { SweepFolder } from '../folder/sweep-folder.js'
import type { Job } from './job.js'
import { keepResult, type ModelOptions, prepareModel } from './make-model.js'

/** Does a step of a model that is cut into parts. Throws as `runInFolder` does; PartError when a step before it is missing. */
export async function makeStep(
  folder: SweepFolder,
  job: Job & { kind: 'heat' | 'part' | 'join' },
  options: ModelOptions
): Promise<void> {
  const { scene, path, all } = await prepareModel(folder, job.model, job.group, options)
  if (job.kind === 'join') {
    await joinInFolder(scene, { ...all, path, runFolders: [] })
    await keepResult(folder, job.model)
  } else
    await runInFolder(scene, {
      ...all,
      path,
      force: false,
      resume: true,
      ...(job.kind === 'part' ? { part: job.part } : { stage: 'dust' })
    })
}
