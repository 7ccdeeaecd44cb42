import { fileURLToPath } from 'node:url'
import type { RunResult } from '../../src/run/run-result.js'
import { runScene } from '../../src/run/run-scene.js'
import type { RunOptions } from '../../src/run/with-crew.js'
import { parseScene } from '../../src/scene/read.js'

const file = fileURLToPath(new URL('./data/scene.yaml', import.meta.url))

/** Runs the scene in a text; its data files lie in `data` beside this file. */
export function runText(text: string, options: Partial<Pick<RunOptions, 'workers' | 'estimator'>> = {}): Promise<RunResult> {
  return runScene(parseScene(text, file), { workers: 2, estimator: 'emissivity', onProgress: () => {}, ...options })
}
