import type { Sweep } from '../types.js'

/** A sweep of more models than this packs its results, and keeps no folder for each model. */
export const mostModelFolders = 5000

export function isPacked({ models }: Pick<Sweep, 'models'>): boolean {
  return models.length > mostModelFolders
}
