import { basename, extname, join, relative } from 'node:path'
import type { Argv, CommandModule, InferredOptionTypes } from 'yargs'
import { estimateSweep } from '../sweep/estimate.js'
import { forgetFailures } from '../sweep/folder/failures.js'
import { openModels, outcomesOf } from '../sweep/folder/outcomes-of.js'
import { openSweep, reopenSweep, type SweepFolder } from '../sweep/folder/sweep-folder.js'
import { summarize } from '../sweep/meaning/summary.js'
import { readPlan } from '../sweep/plan/read-plan.js'
import { runHere } from '../sweep/players/run-here.js'
import { WorkLock } from '../sweep/players/work-lock.js'
import { type Judged, judged } from '../sweep/results/outcomes.js'
import { writeTables } from '../sweep/results/write-tables.js'
import type { QueueEntry } from '../sweep/slurm/queue.js'
import { exitCode } from './exit-code.js'
import { UsageError } from './failure.js'
import { runOptions } from './options.js'
import { startLine } from './status-line.js'
import { startSteps } from './steps.js'
import { stopSignal } from './stop-signal.js'
import { startSweepProgress } from './sweep-progress.js'
import { slurmActions, slurmOptions } from './sweep-slurm.js'
import { summaryText } from './sweep-summary-text.js'
import { countsOf, listJson, listText, standJson, standText } from './sweep-text.js'

const options = {
  out: { ...runOptions.out, defaultDescription: 'out/<name of the plan file>' },
  workers: { ...runOptions.workers, describe: 'Cores to use' },
  memory: runOptions.memory,
  list: { describe: 'Only show the models and about how long they will take', type: 'boolean', default: false },
  summary: { describe: 'Tell what the data of the plan say about its parameters', type: 'boolean', default: false },
  table: { describe: 'Only write the tables of what is finished', type: 'boolean', default: false },
  'retry-failed': { describe: 'Make models that failed once more', type: 'boolean', default: false },
  ...slurmOptions,
  json: runOptions.json,
  quiet: runOptions.quiet
} as const

export type SweepWords = InferredOptionTypes<typeof options> & { plan: string }

/** Of these, one at a time says what is to be done; without any, the models are made. */
const actions = ['list', 'summary', 'table', 'status', 'wait', 'cancel'] as const

/** `motelight sweep PLAN`: makes many models of a scene and their table. */
export const sweep: CommandModule<object, SweepWords> = {
  command: 'sweep <plan>',
  describe: 'Make many models of a scene and a table of their fluxes, and tell what data say about their parameters',
  builder: (yargs: Argv) =>
    yargs
      .positional('plan', { describe: 'Plan file (YAML)', type: 'string', demandOption: true })
      .options(options) as unknown as Argv<SweepWords>,
  handler: async (words) => {
    const asked = actions.filter((action) => words[action])
    if (asked.length > 1) throw new UsageError(`--${asked.join(' and --')}: one at a time`)
    if (words.task) return slurmActions.task(reopenSweep(words.out!), words.task, words.cores)
    const plan = readPlan(words.plan)
    if (words.list) {
      const line = startLine(process.stderr, words.quiet)
      const estimate = await estimateSweep(plan, words.workers, (model) => line.show(`trying model ${model} in small`))
      line.clear()
      return tell(words, listJson(plan, estimate), listText(plan, estimate))
    }
    const folder = await openSweep(words.out ?? join('out', basename(words.plan, extname(words.plan))), plan)
    if (words.retryFailed) await forgetFailures(folder)
    if (words.summary) return sumUp(folder, words)
    const queue = await act(folder, words)
    await finish(folder, words, queue)
  }
}

/** Does what the words ask for; what the queue of Slurm holds, where it was asked. */
async function act(folder: SweepFolder, words: SweepWords): Promise<QueueEntry[] | undefined> {
  if (words.table) return undefined
  if (words.status) return slurmActions.queue(folder)
  if (words.cancel) return slurmActions.cancel(folder)
  if (words.wait) return slurmActions.wait(folder, words.quiet)
  const models = openModels(folder, outcomesOf(folder))
  if (models.length === 0) {
    WorkLock.clear(folder.path)
    return undefined
  }
  if (words.on === 'slurm') return slurmActions.submit(folder, models, words)
  await slurmActions.refuseWhileQueued(folder)
  return make(folder, models, words)
}

/** Makes models on this machine. */
async function make(folder: SweepFolder, models: number[], { workers, memory, quiet }: SweepWords): Promise<undefined> {
  const signal = stopSignal()
  const progress = startSweepProgress(process.stderr, quiet)
  signal.arm()
  try {
    await runHere(folder, models, {
      workers,
      onProgress: progress.show,
      stop: signal.stop,
      ...(memory !== undefined && { memory })
    })
  } finally {
    progress.clear()
    signal.release()
  }
}

/** Tells what the data say, from what is finished. */
async function sumUp(folder: SweepFolder, words: SweepWords): Promise<void> {
  const { sweep: plan, path } = folder
  if (!plan.data) throw new UsageError('--summary needs `data` in the plan')
  const outcomes = judge(folder, words)
  const summary = summarize(plan, outcomes)
  if (!summary) throw new UsageError('--summary: no model is finished yet; the same without it makes them')
  // Drawing needs large packages; other commands start faster without them.
  const { writeSummary } = await import('../sweep/meaning/write-summary.js')
  const steps = startSteps(process.stderr, words.quiet)
  await writeTables(folder, outcomes)
  await writeSummary(folder, outcomes, summary, steps.show)
  tell(words, summary, summaryText(plan, summary, shownPath(path)))
}

/** Writes the tables and tells how the sweep stands. */
async function finish(folder: SweepFolder, words: SweepWords, queue: QueueEntry[] | undefined): Promise<void> {
  const { sweep: plan, path } = folder
  const outcomes = judge(folder, words)
  await writeTables(folder, outcomes)
  tell(words, standJson(plan, outcomes, path, queue), standText(plan, outcomes, shownPath(path), queue))
  const { unfinished, failed, imprecise } = countsOf(plan, outcomes)
  const asksForState = words.status || words.cancel || words.on === 'slurm'
  if (unfinished > 0 && !asksForState) process.exitCode = exitCode.stopped
  else if (unfinished === 0 && failed + imprecise > 0) process.exitCode = exitCode.imprecise
}

/** What is known of the models, compared with the data. */
function judge(folder: SweepFolder, { quiet }: SweepWords): Judged {
  const line = startLine(process.stderr, quiet)
  const all = judged(folder.sweep, outcomesOf(folder), (done, of) => line.show(`${done} of ${of} models compared with the data`))
  line.clear()
  return all
}

/** A folder as the user would write it. */
function shownPath(path: string): string {
  const short = relative(process.cwd(), path)
  return short.startsWith('..') ? path : short
}

function tell({ json }: SweepWords, document: object, text: string): void {
  process.stdout.write(json ? `${JSON.stringify(document, null, 2)}\n` : text)
}
