import type { Worker } from 'node:worker_threads'
import type { FromWorker, ToWorker } from './messages.js'
import { startThread } from './start-thread.js'

/** A task for a worker: the name of its handler, the scope of what it may share with others, and what to hand it. */
export interface Task {
  name: string
  scope?: string
  input: unknown
}

/** A worker threw or died while it held a task. */
export class WorkerFailure extends Error {
  override name = 'WorkerFailure'
}

/** Tasks in hand when a run is stopped may take this long to come to their end, s; then they are given up. */
const GRACE = 5

/** Results wait for their turn, so at most this many tasks a worker are begun ahead of the first unfinished one. */
const AHEAD = 4

/**
 * Worker threads that run tasks side by side and hand back the results in the order of the tasks, so that what is made of
 * them depends neither on the number of workers nor on their speed.
 */
export class WorkerPool {
  /** Busy time of all workers so far, s. */
  cpuSeconds = 0
  private readonly workers: Worker[] = []
  /** Tasks in the hands of each worker. */
  private readonly hands = new Map<Worker, number>()
  private failure: Error | undefined
  /** Lists of tasks under way, in the order in which they came. */
  private readonly jobs: Job[] = []
  private closing = false
  private serial = 0

  constructor(
    readonly size: number,
    script: URL
  ) {
    for (let i = 0; i < size; i++) {
      const worker = startThread(script)
      worker.on('message', (message: FromWorker) => this.receive(worker, message))
      worker.on('error', (error) => this.fail(new WorkerFailure(`a worker thread died: ${error.message}`, { cause: error })))
      worker.on('exit', (code) => {
        if (!this.closing) this.fail(new WorkerFailure(`a worker thread ended unexpectedly (code ${code})`))
      })
      this.workers.push(worker)
      this.hands.set(worker, 0)
    }
  }

  /** Gives every worker a value under a key, for the tasks of a scope; typed arrays on shared memory are not copied. */
  share(key: string, value: unknown, scope = ''): void {
    for (const worker of this.workers) this.post(worker, { kind: 'share', scope, key, value })
  }

  forget(key: string, scope = ''): void {
    for (const worker of this.workers) this.post(worker, { kind: 'forget', scope, key })
  }

  /**
   * Runs the tasks; `onResult` gets each result in the order of the tasks. Several lists may be under way at a time; what came
   * first goes first. When `stop` is aborted, tasks not yet begun are left, and those in hand are finished, or given up with the
   * whole pool if that takes long. Resolves to the number of tasks done; rejects with WorkerFailure.
   */
  run(tasks: Task[], onResult: (output: unknown, index: number) => void, stop?: AbortSignal): Promise<number> {
    if (this.failure) return Promise.reject(this.failure)
    return new Promise((resolve, reject) => {
      const end = () => this.end(job)
      const job: Job = {
        tasks,
        onResult,
        stop,
        end,
        resolve,
        reject,
        begun: 0,
        inHand: 0,
        handed: 0,
        base: this.serial,
        waiting: new Map()
      }
      this.serial += tasks.length
      this.jobs.push(job)
      if (stop?.aborted) this.end(job)
      else stop?.addEventListener('abort', end)
      this.feed()
      this.finishDone()
    })
  }

  /** The result of one task, which takes its turn behind those begun before; undefined when it was stopped before that. */
  async ask(task: Task, stop?: AbortSignal): Promise<unknown> {
    let answer: unknown
    const take = (output: unknown) => {
      answer = output
    }
    await this.run([task], take, stop)
    return answer
  }

  /** Ends every worker. */
  async close(): Promise<void> {
    this.closing = true
    await Promise.all(this.workers.map((worker) => worker.terminate()))
  }

  /** Waits for what is in hand, no longer than GRACE. */
  private end(job: Job): void {
    setTimeout(() => {
      if (!this.jobs.includes(job)) return
      this.finish(job, () => job.resolve(job.handed))
      this.failure ??= new WorkerFailure('the pool was stopped')
    }, 1000 * GRACE).unref()
  }

  private finish(job: Job, settle: () => void): void {
    this.jobs.splice(this.jobs.indexOf(job), 1)
    job.stop?.removeEventListener('abort', job.end)
    settle()
  }

  private post(worker: Worker, message: ToWorker): void {
    worker.postMessage(message)
  }

  private feed(): void {
    for (const job of [...this.jobs]) {
      while (this.mayBegin(job)) {
        const worker = this.freest()
        if (!worker) return
        this.hands.set(worker, this.inHandsOf(worker) + 1)
        const { name, scope = '', input } = job.tasks[job.begun]
        this.post(worker, { kind: 'task', id: job.base + job.begun, name, scope, input })
        job.begun++
        job.inHand++
      }
    }
  }

  /**
   * The worker that has least to do, if it may have another task: one that has one gets the next as long as there are some for all, so
   * that it need not wait while this thread does something else.
   */
  private freest(): Worker | undefined {
    const worker = this.workers.reduce((best, other) => (this.inHandsOf(other) < this.inHandsOf(best) ? other : best))
    const left = this.jobs.reduce((sum, { tasks, begun }) => sum + tasks.length - begun, 0)
    return this.inHandsOf(worker) < (left > this.size ? 2 : 1) ? worker : undefined
  }

  private inHandsOf(worker: Worker): number {
    return this.hands.get(worker) as number
  }

  /** Ends the lists of which nothing is in hand or left. */
  private finishDone(): void {
    for (const job of [...this.jobs]) {
      if (job.inHand === 0 && (job.begun === job.tasks.length || job.stop?.aborted)) {
        this.finish(job, () => job.resolve(job.handed))
      }
    }
  }

  private mayBegin({ begun, handed, tasks, stop }: Job): boolean {
    return begun < tasks.length && begun - handed < AHEAD * this.size && !stop?.aborted
  }

  private receive(worker: Worker, message: FromWorker): void {
    if (message.kind === 'ready') return
    this.hands.set(worker, this.inHandsOf(worker) - 1)
    const job = this.jobs.find(({ base, tasks }) => message.id >= base && message.id < base + tasks.length)
    if (!job) return
    job.inHand--
    if (message.kind === 'failed') {
      this.fail(new WorkerFailure(`a worker thread failed: ${message.message}`, { cause: message.stack }))
      return
    }
    this.cpuSeconds += message.cpuSeconds
    job.waiting.set(message.id - job.base, message.output)
    // Nobody waits while results are taken in.
    this.feed()
    try {
      while (job.waiting.has(job.handed)) {
        const output = job.waiting.get(job.handed)
        job.waiting.delete(job.handed)
        job.onResult(output, job.handed++)
      }
    } catch (error) {
      this.fail(error as Error)
      return
    }
    this.feed()
    this.finishDone()
  }

  private fail(error: Error): void {
    this.failure ??= error
    for (const job of [...this.jobs]) this.finish(job, () => job.reject(error))
  }
}

interface Job {
  tasks: Task[]
  onResult: (output: unknown, index: number) => void
  stop: AbortSignal | undefined
  /** Called when it is to be stopped. */
  end: () => void
  resolve: (done: number) => void
  reject: (error: Error) => void
  begun: number
  inHand: number
  handed: number
  base: number
  waiting: Map<number, unknown>
}
