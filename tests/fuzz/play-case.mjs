import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

/*
 * A process that is handed scene texts and says what became of each: it runs with little effort, or why not. Its parent watches
 * over the time. Words: where the program is built; a folder with the data files.
 */
const [program, folder] = process.argv.slice(2)
const { MemoryError, OutputError, SceneError, Stopped, openRunFolder, parseScene, runScene, writeProducts } = await import(
  program
)

/** Longest run, s, before it is asked to stop. */
const SECONDS = 1.5
const MEMORY = 1e9

process.on('message', async ({ text, products }) => {
  const started = performance.now()
  const outcome = await outcomeOf(text, products)
  process.send({ ...outcome, seconds: (performance.now() - started) / 1000, bytes: process.memoryUsage().rss })
})
process.send({ kind: 'ready' })

async function outcomeOf(text, products) {
  try {
    const scene = parseScene(text, join(folder, 'scene.yaml'))
    const small = {
      ...scene,
      effort: {
        ...scene.effort,
        equilibrium: Math.min(scene.effort.equilibrium, 2000),
        cameras: Math.min(scene.effort.cameras, 500)
      }
    }
    const options = {
      workers: 1,
      estimator: 'emissivity',
      onProgress: () => {},
      memory: MEMORY,
      stop: AbortSignal.timeout(1000 * SECONDS)
    }
    const result = await runScene(small, options)
    if (products) await write(result)
    return { kind: 'ran' }
  } catch (error) {
    if (error instanceof Stopped) return { kind: 'stopped' }
    if (error instanceof MemoryError) return { kind: 'memory', message: error.message }
    if (error instanceof OutputError) return { kind: 'output', message: error.message }
    if (error instanceof SceneError) return { kind: 'refused', message: error.message, problems: error.problems }
    return { kind: 'unexpected', message: String(error?.stack ?? error) }
  }
}

async function write(result) {
  const path = mkdtempSync(join(tmpdir(), 'motelight-fuzz-'))
  try {
    const out = await openRunFolder(join(path, 'out'), 'begin', [])
    await writeProducts(result, out, { started: new Date().toISOString(), workers: 1, estimator: 'emissivity' })
  } finally {
    rmSync(path, { recursive: true, force: true })
  }
}
