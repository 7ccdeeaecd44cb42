import { execFile } from 'node:child_process'
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import type { RunRecord } from '../src/run/run-record.js'
import { ENVELOPE_DUST } from './scenes.js'
import type { Times } from './times.js'
import { USAGE_FILE, type Usage } from './usage.js'

const program = fileURLToPath(new URL('../src/cli/main.js', import.meta.url))
const preload = new URL('./usage.js', import.meta.url).href

/** Exit codes of a run that has its files: done, and done without the precision asked for. */
const FINISHED = [0, 4]

/** The whole command `motelight run`: how long it took, what it used, and where its files are. */
export interface CommandRun extends Times, Usage {
  record: RunRecord
  out: string
}

/** Runs a scene given as a text, or a scene file, as a user would. */
export async function runCommand(
  scene: { text: string } | { file: string },
  folder: string,
  { workers = 1, seed = 0 } = {}
): Promise<CommandRun> {
  mkdirSync(folder, { recursive: true })
  const file = 'file' in scene ? scene.file : join(folder, 'scene.yaml')
  if ('text' in scene) {
    writeFileSync(file, scene.text)
    writeFileSync(join(folder, ENVELOPE_DUST.file), ENVELOPE_DUST.text)
  }
  const out = join(folder, 'out')
  const usageFile = join(folder, 'usage.json')
  const options = ['--workers', String(workers), '--seed', `bench-${seed}`, '--out', out, '--force', '--quiet']
  const words = ['--import', preload, program, 'run', file, ...options]
  const start = performance.now()
  await new Promise<void>((resolve, reject) => {
    const child = execFile(process.execPath, words, { env: { ...process.env, [USAGE_FILE]: usageFile } }, (error, _, stderr) => {
      if (error && !FINISHED.includes(child.exitCode ?? -1)) reject(new Error(stderr || error.message))
      else resolve()
    })
  })
  const wallSeconds = (performance.now() - start) / 1000
  const usage = JSON.parse(readFileSync(usageFile, 'utf8')) as Usage
  return { wallSeconds, ...usage, record: JSON.parse(readFileSync(join(out, 'run.json'), 'utf8')) as RunRecord, out }
}
