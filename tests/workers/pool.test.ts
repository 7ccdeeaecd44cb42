import { afterEach, describe, expect, it } from 'vitest'
import { type Task, WorkerPool } from '../../src/workers/pool.js'

const script = new URL('./faulty-worker.mjs', import.meta.url)
const doubles = (count: number): Task[] => Array.from({ length: count }, (_, i) => ({ name: 'double', input: i }))

let pool: WorkerPool
const open = (size: number) => {
  pool = new WorkerPool(size, script)
  return pool
}
afterEach(() => pool.close())

describe('a pool of workers', () => {
  it.each([1, 2, 3, 8])('%i: hands back results in the order of the tasks', async (size) => {
    const results: unknown[] = []
    const done = await open(size).run(doubles(40), (output, index) => {
      expect(index).toBe(results.length)
      results.push(output)
    })
    expect(done).toBe(40)
    expect(results).toEqual(doubles(40).map(({ input }) => 2 * (input as number)))
  })

  it('runs several lists at a time, each in its order, and one may begin when another is taken', async () => {
    const crew = open(2)
    const results: number[][] = [[], [], []]
    const list = (k: number) => crew.run(doubles(30 + k), (output) => results[k].push(output as number))
    const third: Promise<number>[] = []
    const first = crew.run(doubles(30), (output, index) => {
      results[0].push(output as number)
      if (index === 3) third.push(list(2))
    })
    expect(await Promise.all([first, list(1)])).toEqual([30, 31])
    expect(await third[0]).toBe(32)
    results.forEach((found, k) => {
      expect(found).toEqual(doubles(30 + k).map(({ input }) => 2 * (input as number)))
    })
  })

  it('a failure ends every list', async () => {
    const crew = open(2)
    const tasks = doubles(20)
    tasks[5] = { name: 'fail', input: 0 }
    const lists = await Promise.allSettled([crew.run(tasks, () => {}), crew.run([...doubles(20), ...tasks], () => {})])
    expect(lists.map(({ status }) => status)).toEqual(['rejected', 'rejected'])
  })

  it('finishes what is in hand when stopped, and can go on', async () => {
    const stop = new AbortController()
    const results: unknown[] = []
    const take = (output: unknown) => {
      results.push(output)
      if (results.length === 5) stop.abort()
    }
    const done = await open(2).run(doubles(40), take, stop.signal)
    expect(done).toBe(results.length)
    expect(done).toBeGreaterThanOrEqual(5)
    expect(done).toBeLessThan(40)
    expect(await pool.run(doubles(3), () => {})).toBe(3)
  })

  it('gives up what takes too long to finish when stopped', async () => {
    const stop = new AbortController()
    const tasks = doubles(20)
    tasks[6] = { name: 'never', input: 0 }
    const run = open(2).run(tasks, (_, index) => index === 5 && stop.abort(), stop.signal)
    const start = performance.now()
    expect(await run).toBe(6)
    expect(performance.now() - start).toBeLessThan(30_000)
    await expect(pool.run(doubles(1), () => {})).rejects.toThrow('the pool was stopped')
  })

  it.each([
    ['throw', /a worker thread died: out of control/],
    ['exit', /a worker thread ended unexpectedly \(code 3\)/],
    ['fail', /a worker thread failed: no such thing/]
  ])('a worker that breaks (%s) ends the run with a sentence, in order until then, and for good', async (name, message) => {
    const tasks = doubles(20)
    tasks[9] = { name, input: 0 }
    const results: unknown[] = []
    await expect(open(2).run(tasks, (output) => results.push(output))).rejects.toThrow(message)
    expect(results).toEqual(doubles(results.length).map(({ input }) => 2 * (input as number)))
    await expect(pool.run(doubles(1), () => {})).rejects.toThrow(message)
  })

  it('a fault while taking a result ends the run', async () => {
    const run = open(2).run(doubles(20), (_, index) => {
      if (index === 4) throw new Error('the disk is full')
    })
    await expect(run).rejects.toThrow('the disk is full')
  })

  it('a script that is not there ends the run', async () => {
    pool = new WorkerPool(1, new URL('./nowhere.mjs', import.meta.url))
    await expect(pool.run(doubles(1), () => {})).rejects.toThrow(/a worker thread died: .*nowhere/)
  })
})
