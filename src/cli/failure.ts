import { DataError } from '../data/error.js'
import { OutputError } from '../run/output-error.js'
import { Stopped } from '../run/progress.js'
import { MemoryError } from '../run/require-memory.js'
import { Interrupted } from '../run/run-in-folder.js'
import { PartError } from '../run/run-part.js'
import { StateError } from '../run/state/state-folder.js'
import { SceneError, type SceneProblem } from '../scene/error.js'
import { SlurmError } from '../sweep/slurm/slurm-command.js'
import { type ExitCode, exitCode } from './exit-code.js'
import { resumeCommand } from './resume-command.js'

/** The command line is wrong. */
export class UsageError extends Error {
  override name = 'UsageError'
}

/** What went wrong, for people and for programs. */
export interface Failure {
  code: ExitCode
  kind: 'scene' | 'command-line' | 'data' | 'output' | 'memory' | 'state' | 'slurm' | 'stopped' | 'defect'
  message: string
  problems?: SceneProblem[]
}

export function failureOf(error: unknown): Failure {
  if (error instanceof SceneError) {
    return { code: exitCode.wrongInput, kind: 'scene', message: error.message, problems: error.problems }
  }
  if (error instanceof UsageError) {
    return {
      code: exitCode.wrongInput,
      kind: 'command-line',
      message: `${error.message}\nmotelight --help tells what is accepted.`
    }
  }
  if (error instanceof DataError) return { code: exitCode.wrongInput, kind: 'data', message: error.message }
  if (error instanceof MemoryError) return { code: exitCode.wrongInput, kind: 'memory', message: error.message }
  if (error instanceof StateError || error instanceof PartError)
    return { code: exitCode.wrongInput, kind: 'state', message: error.message }
  if (error instanceof SlurmError) return { code: exitCode.wrongInput, kind: 'slurm', message: error.message }
  if (error instanceof Interrupted) return interruption(error)
  if (error instanceof OutputError) return { code: exitCode.wrongInput, kind: 'output', message: error.message }
  if (error instanceof Stopped) {
    return { code: exitCode.stopped, kind: 'stopped', message: 'Stopped before the end; nothing was written.' }
  }
  return { code: exitCode.defect, kind: 'defect', message: defectMessage(error) }
}

/** What ended a run whose state is on disk; a full disk too is only an interruption then. */
function interruption({ cause }: Interrupted): Failure {
  const goOn = `Its state is kept; this goes on with it:\n  ${resumeCommand(process.argv.slice(2))}`
  if (cause instanceof Stopped) return { code: exitCode.stopped, kind: 'stopped', message: `Stopped before the end. ${goOn}` }
  const { code, kind, message } = failureOf(cause)
  return { code: kind === 'output' ? exitCode.stopped : code, kind, message: `${message}\n${goOn}` }
}

function defectMessage(error: unknown): string {
  const { message, stack } = error instanceof Error ? error : new Error(String(error))
  const advice = 'This is a defect of motelight: please report it together with the scene.'
  const detail = process.env.MOTELIGHT_DEBUG ? stack : 'MOTELIGHT_DEBUG=1 shows where it happened.'
  return `${message}\n${advice}\n${detail}`
}

/** Tells a failure: as one JSON document on stdout, or in words on stderr. */
export function reportFailure({ code, kind, message, problems }: Failure, json: boolean): void {
  if (json) process.stdout.write(`${JSON.stringify({ error: { kind, message, ...(problems && { problems }) } }, null, 2)}\n`)
  else process.stderr.write(`${message}\n`)
  process.exitCode = code
}
