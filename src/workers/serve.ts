import { parentPort } from 'node:worker_threads'
import type { FromWorker, ToWorker } from './messages.js'

/** What a worker was given to share, by key, in the scope of the task. */
export type Shared = (key: string) => unknown

/** One handler a kind of task; it runs on the worker's thread. */
export type Handlers = Record<string, (input: never, shared: Shared) => unknown>

/** Turns the present thread into a worker that answers tasks, one at a time, in the order they come. */
export function serve(handlers: Handlers): void {
  const port = parentPort
  if (!port) throw new Error('serve() runs on a worker thread only')
  const store = new Map<string, unknown>()
  const within = (scope: string, key: string) => `${scope}/${key}`
  port.on('message', (message: ToWorker) => {
    if (message.kind === 'share') store.set(within(message.scope, message.key), message.value)
    else if (message.kind === 'forget') store.delete(within(message.scope, message.key))
    else {
      const reply = answer(message)
      port.postMessage(reply, reply.kind === 'result' ? ownBuffers(reply.output) : [])
    }
  })
  port.postMessage({ kind: 'ready' } satisfies FromWorker)

  function answer(task: Extract<ToWorker, { kind: 'task' }>): FromWorker {
    const start = performance.now()
    const shared: Shared = (key) => {
      const place = within(task.scope, key)
      if (!store.has(place)) throw new Error(`nothing shared under the key ${place}`)
      return store.get(place)
    }
    try {
      const output = handlers[task.name](task.input as never, shared)
      return { kind: 'result', id: task.id, output, cpuSeconds: (performance.now() - start) / 1000 }
    } catch (error) {
      const { message, stack } = error as Error
      return { kind: 'failed', id: task.id, message, stack: stack ?? '' }
    }
  }
}

/** Buffers of the typed arrays in a result, which are handed over instead of copied; shared memory stays where it is. */
function ownBuffers(output: unknown): ArrayBuffer[] {
  const values = ArrayBuffer.isView(output) ? [output] : Object.values((output ?? {}) as object)
  const buffers = values.filter((value) => ArrayBuffer.isView(value)).map((value) => value.buffer)
  return [...new Set(buffers)].filter((buffer) => buffer instanceof ArrayBuffer)
}
