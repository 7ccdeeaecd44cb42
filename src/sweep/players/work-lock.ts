import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { hostname } from 'node:os'
import { join } from 'node:path'
import { setTimeout } from 'node:timers/promises'
import { OutputError } from '../../run/output-error.js'

/** Processes that work in a folder. */
interface Workers {
  host: string
  /** Process numbers with the times they started: a number alone may have been given to another since. */
  parent: [number, string]
  players: [number, string][]
}

/** Players end with their parent, but not before the main thread looks up, s. */
const PATIENCE = 30

/** Sees to it that one motelight at a time runs models of a sweep on this machine. */
export class WorkLock {
  private readonly players: [number, string][] = []

  private constructor(private readonly file: string) {}

  /** Throws OutputError while another process works in the folder. */
  static async take(folder: string): Promise<WorkLock> {
    const file = fileIn(folder)
    const lock = new WorkLock(file)
    const before = readWorkers(file)
    if (before) {
      const { host, parent, players } = before
      if (host !== hostname())
        throw new OutputError(
          `${host} works in ${folder} already (process ${parent[0]}); if it does not any more, remove ${file}`
        )
      if (isAlive(parent)) throw new OutputError(`another motelight works in ${folder} already (process ${parent[0]})`)
      for (let waited = 0; players.some(isAlive); waited += 0.05) {
        if (waited > PATIENCE)
          throw new OutputError(
            `processes of an older motelight still work in ${folder}: ${players.map(([pid]) => pid).join(', ')}`
          )
        await setTimeout(50)
      }
    }
    rmSync(file, { force: true })
    lock.write('wx')
    return lock
  }

  /** Removes what a process left that ended here when all was made. */
  static clear(folder: string): void {
    const file = fileIn(folder)
    const before = readWorkers(file)
    if (before?.host === hostname() && ![before.parent, ...before.players].some(isAlive)) rmSync(file, { force: true })
  }

  add(pid: number): void {
    this.players.push([pid, startOf(pid)])
    this.write('w')
  }

  release(): void {
    rmSync(this.file, { force: true })
  }

  private write(flag: 'w' | 'wx'): void {
    const workers: Workers = { host: hostname(), parent: [process.pid, startOf(process.pid)], players: this.players }
    try {
      writeFileSync(this.file, JSON.stringify(workers), { flag })
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error
      throw new OutputError(`another motelight has just begun to work there (${this.file})`)
    }
  }
}

const fileIn = (folder: string) => join(folder, 'working.json')

function readWorkers(file: string): Workers | undefined {
  if (!existsSync(file)) return undefined
  try {
    return JSON.parse(readFileSync(file, 'utf8')) as Workers
  } catch {
    return undefined // Cut short by a crash: whoever wrote it is gone.
  }
}

function isAlive([pid, start]: [number, string]): boolean {
  try {
    process.kill(pid, 0)
    return startOf(pid) === start
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'EPERM'
  }
}

/** When a process started, as Linux counts (field 22 of proc(5) stat); empty where that is not told. */
function startOf(pid: number): string {
  try {
    return readFileSync(`/proc/${pid}/stat`, 'utf8').replace(/^.*\)/s, '').split(' ')[20]
  } catch {
    return ''
  }
}
