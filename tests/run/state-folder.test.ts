import { existsSync, readdirSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { difference, type Identity } from '../../src/run/state/identity.js'
import { StateFolder } from '../../src/run/state/state-folder.js'
import { folderWith } from '../support/folder-with.js'

const identity: Identity = {
  version: '1.0.0',
  seed: 'a',
  inputs: [
    { file: 'scene.yaml', sha256: '00' },
    { file: 'soot.csv', sha256: '11' }
  ],
  estimator: 'emissivity'
}

const newPath = () => join(folderWith(), 'state')

describe('a folder of pieces', () => {
  it('gives the last piece kept under a name to another process, until it is forgotten', async () => {
    const path = newPath()
    const ledger = new StateFolder(path, identity)
    expect(ledger.take('light-0')).toBeUndefined()
    for (let done = 0; done < 20; done++) ledger.keep('light-0', { done, values: Float64Array.of(done) })
    ledger.keep('packets-1', { done: 1 })
    await ledger.settle()
    const other = new StateFolder(path, identity)
    expect(other.take('light-0')).toEqual({ done: 19, values: Float64Array.of(19) })
    other.forget('packets-1')
    await other.settle()
    expect(other.take('packets-1')).toBeUndefined()
    expect(readdirSync(path)).toEqual(['light-0.bin'])
  })

  it('never removes a piece before the one that follows from it is there', async () => {
    const path = newPath()
    const ledger = new StateFolder(path, identity)
    ledger.keep('packets-0', { done: 1 })
    await ledger.settle()
    // Kept, kept again and then given up for the wavelength that is done: at every moment one of the two is on disk.
    ledger.keep('packets-0', { done: 2, values: new Float64Array(1e6) })
    ledger.keep('light-0', { values: new Float64Array(1e6) })
    ledger.forget('packets-0')
    let settled = false
    const end = ledger.settle().then(() => {
      settled = true
    })
    while (!settled) {
      expect(existsSync(join(path, 'light-0.bin')) || existsSync(join(path, 'packets-0.bin'))).toBe(true)
      await new Promise((resolve) => setImmediate(resolve))
    }
    await end
    expect(readdirSync(path)).toEqual(['light-0.bin'])
  })

  it('takes milestones at once, other offers only after some time', async () => {
    const ledger = new StateFolder(newPath(), identity)
    ledger.offer('packets-0', () => ({ done: 1 }))
    await ledger.settle()
    expect(ledger.take('packets-0')).toBeUndefined()
    ledger.offer('packets-0', () => ({ done: 2 }), true)
    await ledger.settle()
    expect(ledger.take('packets-0')).toEqual({ done: 2 })
  })

  it('a folder that cannot be written is a sentence, at the next word with the ledger', async () => {
    const path = newPath()
    writeFileSync(path, 'in the way')
    const ledger = new StateFolder(path, identity)
    ledger.keep('dust', {})
    await expect(ledger.settle()).rejects.toThrow(/cannot write .*state: a file/)
    expect(() => ledger.keep('dust', {})).toThrow(/cannot write/)
    expect(() => ledger.offer('dust', () => ({}))).toThrow(/cannot write/)
  })

  it('damaged pieces are refused, naming the file', async () => {
    const path = newPath()
    const ledger = new StateFolder(path, identity)
    ledger.keep('dust', {})
    await ledger.settle()
    writeFileSync(join(path, 'dust.bin'), 'something else, long enough to hold a checksum at its end, were it one of ours')
    expect(() => ledger.take('dust')).toThrow(/dust\.bin cannot be used: it is not a piece/)
  })
})

describe('pieces of another run', () => {
  const [scene, table] = identity.inputs
  it.each<[string, Partial<Identity>, RegExp]>([
    ['version', { version: '1.0.1' }, /made by motelight 1\.0\.0, this is 1\.0\.1/],
    ['seed', { seed: 'b' }, /seed was "a", now it is "b"/],
    ['scene', { inputs: [{ ...scene, sha256: '22' }, table] }, /scene\.yaml has changed/],
    ['data file', { inputs: [scene, { ...table, sha256: '22' }] }, /soot\.csv has changed/],
    ['fewer data files', { inputs: [scene] }, /other data files/],
    ['estimator', { estimator: 'peel' }, /estimator was emissivity, now it is peel/]
  ])('are refused for their %s, saying so', async (_, change, message) => {
    const path = newPath()
    const ledger = new StateFolder(path, identity)
    ledger.keep('light-0', {})
    await ledger.settle()
    expect(() => new StateFolder(path, { ...identity, ...change }).take('light-0')).toThrow(message)
  })

  it('files may have moved, and dust serves every estimator', async () => {
    const moved = { ...identity, inputs: identity.inputs.map(({ file, sha256 }) => ({ file: `/elsewhere/${file}`, sha256 })) }
    expect(difference(identity, moved)).toBeUndefined()
    const path = newPath()
    const ledger = new StateFolder(path, identity)
    ledger.keep('dust', { done: 1 })
    await ledger.settle()
    expect(new StateFolder(path, { ...moved, estimator: 'exit' }).take('dust')).toEqual({ done: 1 })
  })
})
