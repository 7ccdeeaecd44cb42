import type { Estimate } from '../sweep/estimate.js'
import { inScene } from '../sweep/plan/value.js'
import type { Outcomes } from '../sweep/results/outcomes.js'
import { type ModelState, stateOf } from '../sweep/results/sweep-table.js'
import { tableNames } from '../sweep/results/write-tables.js'
import { isLive, isLost, isStuck, type QueueEntry } from '../sweep/slurm/queue.js'
import type { Sweep } from '../sweep/types.js'
import { duration, table } from './words.js'

/** Models of a long list that are shown at its beginning and its end; `--json` has them all. */
const [FIRST, LAST] = [40, 3]
/** Failures told. */
const TOLD = 5

/** What `--list` says. */
export function listText(sweep: Sweep, { secondsAModel, seconds, cores, tried, complete }: Estimate): string {
  const { title, models, parameters, design } = sweep
  const row = (model: number) => [
    String(model).padStart(String(models.length).length),
    ...models[model - 1].map((value, p) => String(inScene(value, parameters[p].unit)))
  ]
  const numbers = models.map((_, i) => i + 1)
  const long = models.length > FIRST + LAST + 1
  const from = `from models ${tried.join(', ')}, tried in small`
  const time = complete
    ? `about ${duration(secondsAModel)} a model on one core, about ${duration(seconds)} for all on ${cores} ${cores === 1 ? 'core' : 'cores'} (${from})`
    : `how long they take is unknown: models ${tried.join(', ')}, tried in small, did not come to their end`
  return [
    `${title}: ${models.length} ${models.length === 1 ? 'model' : 'models'}, design ${design}`,
    ...table([
      ['model', ...parameters.map(({ name }) => name)],
      ...(long ? numbers.slice(0, FIRST) : numbers).map(row),
      ...(long ? [['...'], ...numbers.slice(-LAST).map(row)] : [])
    ]),
    time,
    ''
  ].join('\n')
}

/** What `--list --json` says. */
export function listJson({ title, models, parameters, design }: Sweep, estimate: Estimate): object {
  return {
    title,
    design,
    parameters: parameters.map(({ name, unit, role }) => ({ name, unit, role })),
    models: models.map((values, i) => ({ model: i + 1, values })),
    estimate
  }
}

/** How many models stand how. */
export function countsOf({ models }: Sweep, outcomes: Outcomes): Record<ModelState, number> {
  const counts = { done: 0, imprecise: 0, failed: 0, unfinished: 0 }
  models.forEach((_, i) => {
    counts[stateOf(i + 1, outcomes)]++
  })
  return counts
}

/** How a sweep stands, its jobs where Slurm was asked, and where its tables are. */
export function standText(sweep: Sweep, outcomes: Outcomes, path: string, queue?: QueueEntry[]): string {
  return [
    `${sweep.title}: ${countsText(sweep, outcomes)}`,
    ...failureLines(outcomes),
    ...(queue ? queueLines(queue, countsOf(sweep, outcomes).unfinished) : []),
    `The tables are in ${path}: ${tableNames.join(', ')}`,
    ''
  ].join('\n')
}

/** The same for `--json`. */
export function standJson(sweep: Sweep, outcomes: Outcomes, path: string, queue?: QueueEntry[]): object {
  const failures = [...outcomes.failures.values()].filter(({ model }) => !outcomes.results.has(model))
  return { folder: path, models: sweep.models.length, ...countsOf(sweep, outcomes), failures, ...(queue && { queue }) }
}

/** How many tasks are in which state. */
export function queueText(queue: QueueEntry[]): string {
  const live = queue.filter(isLive)
  const states = [...new Set(live.map(({ state }) => state))].sort()
  const counts = states.map((state) => `${live.filter((entry) => entry.state === state).length} ${state.toLowerCase()}`)
  return `Slurm: ${counts.join(', ') || 'no job is left'}`
}

function queueLines(queue: QueueEntry[], unfinished: number): string[] {
  const live = queue.some(isLive)
  const ends = [...new Set(queue.filter(isLost).map(({ state }) => state))]
  const stuck = [
    ...new Set(queue.filter(isStuck).map(({ job, reason }) => `job ${job} waits for what can never come (${reason})`))
  ]
  return [
    queueText(queue),
    ...ends.map((end) => `  ${queue.filter((entry) => isLost(entry) && entry.state === end).length} ended: ${end}`),
    ...stuck.map((line) => `  ${line}; --cancel takes it back`),
    ...(live || unfinished === 0
      ? []
      : [`  nobody works on ${unfinished} models: the same command without --wait or --status goes on, here or with --on slurm`])
  ]
}

export function countsText(sweep: Sweep, outcomes: Outcomes): string {
  const { done, imprecise, failed, unfinished } = countsOf(sweep, outcomes)
  const parts = [
    `${done + imprecise} of ${sweep.models.length} models done`,
    ...(imprecise > 0 ? [`${imprecise} of them short of the precision asked for`] : []),
    ...(failed > 0 ? [`${failed} failed`] : []),
    ...(unfinished > 0 ? [`${unfinished} unfinished`] : [])
  ]
  return parts.join(', ')
}

export function failureLines({ failures, results }: Outcomes): string[] {
  const failed = [...failures.values()].filter(({ model }) => !results.has(model))
  return [
    ...failed.slice(0, TOLD).map(({ model, message }) => `  model ${model} failed: ${message.split('\n')[0]}`),
    ...(failed.length > TOLD ? [`  and ${failed.length - TOLD} more; the table has all reasons`] : []),
    ...(failed.length > 0 ? ['  --retry-failed makes them once more'] : [])
  ]
}
