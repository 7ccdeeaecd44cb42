import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { execa } from 'execa'
import { program, sceneWith } from '../cli/motelight.js'
import { folderWith } from '../support/folder-with.js'
import { visibilityPlan, visibilityText } from '../sweep/example.js'
import { processesWith } from './cluster.js'

/** Eight models in pairs of the same dust, compared with data by their images. */
export const planText = `title: Small winds
scene: scene.yaml
vary:
  dust.wind.amount.optical-depth: {from: 0.5, to: 2, count: 4, spacing: log}
  distance: [300 pc, 400 pc]
${visibilityPlan}`

/** A folder with a plan and its scene; `packets` decide how long a model takes; `within` is a folder in it. */
export function sweepFolder(plan = planText, packets = 2000, within = ''): string {
  const folder = folderWith({
    [join(within, 'scene.yaml')]: sceneWith(['equilibrium: 8000, cameras: 2000', `equilibrium: 8000, cameras: ${packets}`]),
    [join(within, 'plan.yaml')]: plan,
    [join(within, 'uv.csv')]: visibilityText
  })
  return join(folder, within)
}

/** Runs `motelight sweep plan.yaml` in a folder. */
export function sweep(cwd: string, env: Record<string, string>, ...words: string[]) {
  return execa(process.execPath, [program, 'sweep', 'plan.yaml', '--quiet', ...words], {
    cwd,
    reject: false,
    env: { MOTELIGHT_DEBUG: '1', ...env }
  })
}

/** The bytes of both tables. */
export function tablesOf(folder: string): string[] {
  return ['models.ecsv', 'models.parquet'].map((name) => readFileSync(join(folder, 'out/plan', name)).toString('base64'))
}

/** Processes that do tasks of the sweep in a folder, by what they do, and where (default: anywhere). */
export function tasksOf(folder: string, kind: string, node = ''): number[] {
  return processesWith(...(node ? [`SLURMD_NODENAME=${node}`] : [])).filter((pid) => {
    try {
      const words = readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0')
      const ours = words[1]?.endsWith('main.js') && words.includes(join(folder, 'out/plan'))
      return ours && words.some((word) => word.includes(`/${kind}/`))
    } catch {
      return false // It has ended meanwhile.
    }
  })
}
