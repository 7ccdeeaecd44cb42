import { readFileSync, writeFileSync } from 'node:fs'
import { isMainThread } from 'node:worker_threads'

/** What a process used, as it tells when it ends. */
export interface Usage {
  /** All threads together. */
  cpuSeconds: number
  /** The main thread alone; NaN where the system does not tell. */
  mainCpuSeconds: number
  peakBytes: number
}

/** Names the file that the usage goes to. */
export const USAGE_FILE = 'MOTELIGHT_BENCH_USAGE'

/** Loaded before the program by `node --import`: writes what it used when it ends. */
const file = process.env[USAGE_FILE]
if (isMainThread && file) {
  process.on('exit', () => {
    const { userCPUTime, systemCPUTime, maxRSS } = process.resourceUsage()
    const usage: Usage = {
      cpuSeconds: (userCPUTime + systemCPUTime) / 1e6,
      mainCpuSeconds: mainThreadSeconds(),
      peakBytes: maxRSS * 1024
    }
    writeFileSync(file, JSON.stringify(usage))
  })
}

/** User and system time of the main thread in ticks of 10 ms: fields 14 and 15 of proc(5). */
function mainThreadSeconds(): number {
  try {
    const text = readFileSync(`/proc/self/task/${process.pid}/stat`, 'utf8')
    const fields = text.slice(text.lastIndexOf(')') + 2).split(' ')
    return (Number(fields[11]) + Number(fields[12])) / 100
  } catch {
    return Number.NaN
  }
}
