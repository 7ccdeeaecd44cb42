import type { PhaseLaw, Scene } from './types.js'

/** Whether some dust of a scene polarises the light that it scatters. */
export function isPolarised({ dust, opacities }: Pick<Scene, 'dust' | 'opacities'>): boolean {
  return dust.some(({ opacity }) => polarises(opacities[opacity].phase))
}

/** Whether a scattering law polarises. */
export function polarises(phase: PhaseLaw): boolean {
  if (typeof phase === 'string') return phase === 'rayleigh' || phase === 'computed'
  return phase.kind === 'table' && phase.table.s12.some((value) => value !== 0)
}
