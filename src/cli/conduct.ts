import type { FolderOutcome } from '../run/run-in-folder.js'
import type { RunOptions } from '../run/with-crew.js'
import type { Scene } from '../scene/types.js'
import { exitCode } from './exit-code.js'
import type { RunWords } from './options.js'
import { outcomeText } from './outcome-text.js'
import { startProgress } from './progress.js'
import { stopSignal } from './stop-signal.js'

/** Lets a command work in a folder, with progress and signals, and tells what came of it. */
export async function conduct(
  scene: Scene,
  path: string,
  { workers, estimator, memory, 'cell-edges': cellEdges, json, quiet }: RunWords,
  work: (request: RunOptions & { path: string }) => Promise<FolderOutcome>
): Promise<void> {
  const signal = stopSignal()
  const progress = startProgress(process.stderr, scene.effort, quiet)
  try {
    const outcome = await work({
      path,
      workers,
      estimator,
      cellEdges,
      stop: signal.stop,
      onBegin: signal.arm,
      onProgress: progress.show,
      ...(memory !== undefined && { memory })
    })
    progress.clear()
    const record = outcome.kind === 'products' ? outcome.record : undefined
    process.stdout.write(json ? `${JSON.stringify({ folder: path, ...record }, null, 2)}\n` : outcomeText(outcome, path))
    if (record && !record.precision.reached) process.exitCode = exitCode.imprecise
  } finally {
    progress.clear()
    signal.release()
  }
}
