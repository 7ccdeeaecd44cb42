import type { Part } from '../../run/run-part.js'
import { dustLeads, sharedDust } from '../folder/dust-groups.js'
import type { SweepFolder } from '../folder/sweep-folder.js'
import { hasDust } from './make-dust.js'
import type { Group } from './make-model.js'

/**
 * A piece of work that one process does at a time: temperatures that models share, a model, or a step of a model that is cut into
 * parts (its own temperatures, a part of its packets, and what becomes of all parts).
 */
export type Job =
  | { kind: 'dust'; lead: number; members: number[] }
  | { kind: 'model'; model: number; group: Group }
  | { kind: 'heat' | 'join'; model: number; group: Group }
  | { kind: 'part'; model: number; group: Group; part: Part }

/** What has to be done for some models: shared temperatures that are not there, and the models themselves, in their order. */
export function jobsFor(
  folder: SweepFolder,
  models: number[]
): { dust: (Job & { kind: 'dust' })[]; models: (Job & { kind: 'model' })[] } {
  const leads = dustLeads(folder.sweep)
  const groups = sharedDust(leads)
  const needed = new Set(models.map((model) => leads[model - 1]).filter((lead) => groups.has(lead)))
  return {
    dust: [...needed]
      .filter((lead) => !hasDust(folder, lead))
      .map((lead) => ({ kind: 'dust', lead, members: groups.get(lead)! })),
    models: models.map((model) => {
      const lead = leads[model - 1]
      const members = groups.get(lead)
      return { kind: 'model', model, group: members && { lead, members } }
    })
  }
}
