import { describe, expect, it } from 'vitest'
import { inLanes } from '../../src/run/in-lanes.js'

/** Resolves after some turns of the event loop. */
async function turns(count: number): Promise<void> {
  for (let i = 0; i < count; i++) await new Promise(setImmediate)
}

describe('work in lanes', () => {
  it('begins items in their order, so many at a time', async () => {
    const begun: number[] = []
    let under = 0
    let most = 0
    await inLanes([5, 1, 4, 2, 3], 2, async (item, index) => {
      begun.push(index)
      most = Math.max(most, ++under)
      await turns(item)
      under--
    })
    expect(begun).toEqual([0, 1, 2, 3, 4])
    expect(most).toBe(2)
  })

  it('begins nothing after a failure, waits for what is under way, and tells the first failure', async () => {
    const ended: number[] = []
    const work = inLanes([3, 1, 9, 9], 2, async (item, index) => {
      await turns(item)
      ended.push(index)
      if (index < 2) throw new Error(`item ${index}`)
    })
    await expect(work).rejects.toThrow('item 1')
    expect(ended).toEqual([1, 0])
  })
})
