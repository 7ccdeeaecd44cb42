import type { Scene } from './types.js'

/** Whether light comes from outside the dust. */
export function hasAmbient({ sources }: Pick<Scene, 'sources'>): boolean {
  return sources.some(({ kind }) => kind === 'ambient')
}
