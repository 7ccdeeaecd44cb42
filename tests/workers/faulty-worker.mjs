import { parentPort } from 'node:worker_threads'

// A worker for tests of the pool: answers a number with its double after a while, and breaks when told to.
parentPort.on('message', (message) => {
  if (message.kind !== 'task') return
  const { id, name, input } = message
  if (name === 'never') return
  if (name === 'exit') process.exit(3)
  if (name === 'throw')
    setImmediate(() => {
      throw new Error('out of control')
    })
  else if (name === 'fail') parentPort.postMessage({ kind: 'failed', id, message: 'no such thing', stack: '' })
  else setTimeout(() => parentPort.postMessage({ kind: 'result', id, output: 2 * input, cpuSeconds: 0 }), (id * 7) % 11)
})
parentPort.postMessage({ kind: 'ready' })
