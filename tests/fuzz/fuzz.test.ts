import { type ChildProcess, fork } from 'node:child_process'
import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, describe, expect, it } from 'vitest'
import { stream } from '../../src/math/random.js'
import { folderWith } from '../support/folder-with.js'
import { mutatedScene, mutatedTable } from './mutate.js'
import { seeds, tables } from './seeds.js'

/** Inputs tried; `npm run test:fuzz` asks for 10,000. One in five changes a table instead of the scene. */
const CASES = Number(process.env.FUZZED ?? 120)
/** The first case, to look at one again. */
const FIRST = Number(process.env.FUZZ_FROM ?? 0)
const PROCESSES = 2
/** A case still silent after this many seconds hangs: runs are asked to stop after 1.5, and then have 5. */
const HANGS = 40
const MOST_BYTES = 3e9
/** One in so many that run also writes its products. */
const WRITES = 4

const script = fileURLToPath(new URL('./play-case.mjs', import.meta.url))
const library = new URL('../../dist/index.js', import.meta.url).href

interface Outcome {
  kind: 'ran' | 'refused' | 'memory' | 'output' | 'stopped' | 'unexpected' | 'hangs' | 'died'
  message?: string
  problems?: { location: { file: string; line: number; column: number }; key: string; message: string }[]
  seconds: number
  bytes: number
}

/** A process that plays cases one after another, replaced when it hangs or dies. */
class Player {
  readonly folder = folderWith()
  private child: ChildProcess | undefined

  async play(text: string, tableTexts: Record<string, string>, products: boolean): Promise<Outcome> {
    for (const [name, content] of Object.entries(tableTexts)) writeFileSync(join(this.folder, name), content)
    this.child ??= await this.begin()
    const child = this.child
    return new Promise((resolve) => {
      const end = (outcome: Outcome) => {
        clearTimeout(timer)
        child.off('message', told).off('exit', died)
        resolve(outcome)
      }
      const lost = (kind: 'hangs' | 'died') => {
        this.child = undefined
        child.kill('SIGKILL')
        end({ kind, seconds: HANGS, bytes: 0 })
      }
      const told = (outcome: unknown) => end(outcome as Outcome)
      const died = () => lost('died')
      const timer = setTimeout(() => lost('hangs'), 1000 * HANGS)
      child.on('message', told).on('exit', died)
      child.send({ text, products })
    })
  }

  close(): void {
    this.child?.kill('SIGKILL')
  }

  private begin(): Promise<ChildProcess> {
    const child = fork(script, [library, this.folder], {
      execArgv: ['--max-old-space-size=1500'],
      env: { ...process.env, XDG_CACHE_HOME: this.folder }
    })
    return new Promise((resolve) => child.once('message', () => resolve(child)))
  }
}

const players: Player[] = []
afterAll(() => {
  for (const player of players) player.close()
})

/** What is wrong with an outcome; undefined for one that may be. */
function fault({ kind, message, problems, bytes }: Outcome): string | undefined {
  if (kind === 'unexpected' || kind === 'hangs' || kind === 'died' || kind === 'output') return `${kind}: ${message}`
  if (bytes > MOST_BYTES) return `it took ${bytes} bytes`
  if (kind !== 'refused') return undefined
  if (!problems || problems.length === 0) return 'no problem is named'
  for (const { location, message: told } of problems)
    if (!(location.line >= 1 && location.column >= 1 && location.file && told.length > 0)) return `not located: ${told}`
  if (message!.length > 20_000) return `a message of ${message!.length} characters`
  return /\n\s+at |undefined|\[object /.test(message!) ? `not for people: ${message!.slice(0, 500)}` : undefined
}

describe('changed inputs', () => {
  it(`${CASES} of them run or are refused with a located message`, { timeout: 1000 * (120 + 3 * CASES) }, async () => {
    const counts: Record<string, number> = {}
    const faults: string[] = []
    let next = FIRST
    const work = async (player: Player) => {
      while (next < FIRST + CASES) {
        const n = next++
        const uniform = stream(`fuzz/${n}`)
        const seed = seeds[n % seeds.length]
        const table = n % 5 === 4
        const text = table ? seeds[1 + (Math.floor(n / 5) % 3)] : mutatedScene(seed, uniform)
        const tableTexts = table
          ? Object.fromEntries(Object.entries(tables).map(([name, content]) => [name, mutatedTable(content, uniform)]))
          : tables
        const outcome = await player.play(text, tableTexts, n % WRITES === 0)
        counts[outcome.kind] = (counts[outcome.kind] ?? 0) + 1
        const wrong = fault(outcome)
        if (wrong) faults.push(`case ${n} (FUZZ_FROM=${n} FUZZED=1), ${outcome.seconds.toFixed(1)} s: ${wrong}`)
      }
    }
    for (let i = 0; i < PROCESSES; i++) players.push(new Player())
    await Promise.all(players.map(work))
    console.info(`fuzz: ${JSON.stringify(counts)}`)
    expect(faults).toEqual([])
    // Enough get through to say something about running (to the end, or until time was up), and enough do not.
    if (CASES >= 100) {
      expect((counts.ran ?? 0) + (counts.stopped ?? 0)).toBeGreaterThan(0.1 * CASES)
      expect(counts.refused).toBeGreaterThan(0.1 * CASES)
    }
  })
})
