import { join } from 'node:path'
import { readPlan } from '../../src/sweep/plan/read-plan.js'
import { folderWith, sceneText } from '../cli/motelight.js'

export const dataText = `wavelength [um], flux [Jy], sigma [Jy]
2.2, 300, 10
10, 200, 10
60, 8, 1
`

/** A folder with the small scene, a plan about it, and files more. */
export function planFolder(plan: string, files: Record<string, string> = {}): string {
  return folderWith({ 'scene.yaml': sceneText, 'plan.yaml': `scene: scene.yaml\n${plan}`, 'fluxes.csv': dataText, ...files })
}

/** The sweep of a plan about the small scene. */
export function planned(plan: string, files: Record<string, string> = {}) {
  return readPlan(join(planFolder(plan, files), 'plan.yaml'))
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
