import { join } from 'node:path'
import type { DataList } from '../../src/compare/types.js'
import { parseTable } from '../../src/data/table.js'
import { readPlan } from '../../src/sweep/plan/read-plan.js'
import { sceneText } from '../cli/motelight.js'
import { folderWith } from '../support/folder-with.js'

export const dataText = `wavelength [um], flux [Jy], sigma [Jy]
2.2, 300, 10
10, 200, 10
60, 8, 1
`

/** Data that need the images of models: visibilities in the file `uv.csv`. */
export const visibilityPlan = 'data: [{name: array, kind: visibilities, file: uv.csv, camera: face, wavelength: 60 um}]\n'
export const visibilityText = `east [m], north [m], amplitude [Jy], sigma [Jy]
3, 0, 9, 1
0, 5, 7, 1
`

/** A folder with the small scene, a plan about it, and files more. */
export function planFolder(plan: string, files: Record<string, string> = {}): string {
  return folderWith({ 'scene.yaml': sceneText, 'plan.yaml': `scene: scene.yaml\n${plan}`, 'fluxes.csv': dataText, ...files })
}

/** The sweep of a plan about the small scene. */
export function planned(plan: string, files: Record<string, string> = {}) {
  return readPlan(join(planFolder(plan, files), 'plan.yaml'))
}

/** Measured fluxes of the set `old`, as they are compared with the spectrum `data-old`. */
export function fluxList(wavelengthUm: number[], fluxJy: number[], sigmaJy: number[]): DataList {
  const rows = wavelengthUm.map((wavelength, i) => `${wavelength}, ${fluxJy[i]}, ${sigmaJy[i]}`)
  const table = parseTable(['wavelength [um], flux [Jy], sigma [Jy]', ...rows].join('\n'), 'fluxes.csv')
  return {
    free: [],
    sets: [{ name: 'old', kind: 'photometry', spectrum: 'data-old', table, errors: 'sigma', bands: new Map() }],
    inputs: [],
    problemAt: (_, message) => ({ location: { file: 'plan.yaml', line: 1, column: 1 }, key: '', message })
  }
}

/** The problems of a plan: place in its file, key and message. */
export function problemsOf(plan: string, files: Record<string, string> = {}): { at: string; key: string; message: string }[] {
  try {
    planned(plan, files)
    return []
  } catch (error) {
    const { problems } = error as {
      problems?: { location: { file: string; line: number; column: number }; key: string; message: string }[]
    }
    if (!problems) throw error
    return problems.map(({ location: { file, line, column }, key, message }) => ({
      at: `${file.split('/').pop()}:${line}:${column}`,
      key,
      message
    }))
  }
}
