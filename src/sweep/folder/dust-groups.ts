import type { ScenePath } from '../../scene/types.js'
import type { Sweep } from '../types.js'

/** Keys of cameras and spectra that dust temperatures do not depend on; their wavelengths decide how many packets are needed. */
const ofObserver = ['view', 'field', 'pixels', 'aperture', 'unit']

/**
 * For each model, the first one whose dust is the same (numbered from 1): models that differ only in distance, place on the sky,
 * title, views, fields, pixels, apertures and units share their dust temperatures.
 */
export function dustLeads({ parameters, models }: Pick<Sweep, 'parameters' | 'models'>): number[] {
  const matter = parameters.map(({ path }) => touchesDust(path))
  const first = new Map<string, number>()
  return models.map((values, i) => {
    const key = JSON.stringify(values.filter((_, p) => matter[p]))
    if (!first.has(key)) first.set(key, i + 1)
    return first.get(key)!
  })
}

/** Lead and members of every group of more than one model. */
export function sharedDust(leads: number[]): Map<number, number[]> {
  const groups = new Map<number, number[]>()
  leads.forEach((lead, i) => {
    if (groups.has(lead)) groups.get(lead)!.push(i + 1)
    else groups.set(lead, [i + 1])
  })
  for (const [lead, members] of groups) if (members.length === 1) groups.delete(lead)
  return groups
}

function touchesDust([section, , key]: ScenePath): boolean {
  if (section === 'distance' || section === 'sky' || section === 'title') return false
  return !((section === 'cameras' || section === 'spectra') && ofObserver.includes(String(key)))
}
