import { openResults } from '../folder/open-results.js'
import type { SweepFolder } from '../folder/sweep-folder.js'
import { attempt } from '../players/attempt.js'
import { type Job, jobsFor } from '../players/job.js'
import type { ModelOptions } from '../players/make-model.js'
import { readSubmission } from './submission.js'

/** Kinds of tasks that make something. */
export type TaskKind = 'dust' | 'models' | 'heat' | 'parts' | 'join'

/** Which task of which submission a process is, such as `2/models/1000` with the number that Slurm gives it within its array. */
export interface TaskName {
  serial: number
  kind: TaskKind
  index: number
}

/** Does the jobs of a task, one after the other. Throws OutputError. */
export async function runTask(
  folder: SweepFolder,
  { serial, kind, index }: TaskName,
  options: ModelOptions
): Promise<'done' | 'stopped'> {
  const submission = readSubmission(folder, serial)
  const store = openResults(folder)
  for (const job of jobsOf()) {
    if (job.kind !== 'dust' && store.finished([job.model]).has(job.model)) continue
    if ((await attempt(folder, job, options)) === 'stopped') return 'stopped'
  }
  return 'done'

  function jobsOf(): Job[] {
    const { dust, models, parts } = submission
    if (kind === 'dust') return jobsFor(folder, [dust[index]]).dust
    if (kind === 'models') return jobsFor(folder, models[index]).models
    const of = kind === 'parts' ? parts : 1
    const [{ model, group }] = jobsFor(folder, models[Math.floor(index / of)]).models
    if (kind === 'parts') return [{ kind: 'part', model, group, part: { index: 1 + (index % of), of } }]
    return [{ kind, model, group }]
  }
}
