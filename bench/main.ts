import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { availableParallelism, cpus, tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { version } from '../src/output/version.js'
import type { BenchCase } from './case.js'
import { bias } from './cases/bias.js'
import { figureOfMerit } from './cases/figure-of-merit.js'
import { grainTableCases } from './cases/grain-tables.js'
import { memory } from './cases/memory.js'
import { octree } from './cases/octree.js'
import { packetLoop } from './cases/packet-loop.js'
import { polarisedCases } from './cases/polarised.js'
import { scaling } from './cases/scaling.js'
import { stateCases } from './cases/state.js'
import { thickDust } from './cases/thick-dust.js'
import { wholeRunCases } from './cases/whole-runs.js'
import { workerCases } from './cases/workers.js'
import { compileNative } from './native.js'
import { type Row, rowOf, tableLines } from './table.js'

/** `npm run bench` runs every case, `npm run bench -- NAME...` that case, or all of a family such as `shell`. */
const cases: BenchCase[] = [
  ...packetLoop,
  ...figureOfMerit,
  ...bias,
  ...wholeRunCases,
  thickDust,
  ...polarisedCases,
  ...scaling,
  ...octree,
  ...workerCases,
  ...stateCases,
  ...grainTableCases,
  ...memory
]

const project = fileURLToPath(new URL('../../', import.meta.url))
const wanted = process.argv.slice(2)
const chosen =
  wanted.length > 0 ? cases.filter(({ name }) => wanted.some((word) => name === word || name.startsWith(`${word}-`))) : cases
if (chosen.length === 0) {
  console.error(`no case is called ${wanted.join(' or ')}; cases: ${cases.map(({ name }) => name).join(', ')}`)
  process.exit(2)
}

const folder = mkdtempSync(join(tmpdir(), 'motelight-bench-'))
const rows: Row[] = []
/** What measuring each case took. */
const seconds: Record<string, number> = {}
try {
  const native = compileNative(join(project, 'bench', 'native'), folder)
  if (!native) console.log('No C compiler (gcc): cases against C are left out.')
  for (const { name, about, run, native: needed } of chosen) {
    if (needed && !native) continue
    console.log(`\n${name}: ${about}`)
    const started = performance.now()
    const found = (await run({ native, folder })).map((measure) => rowOf(name, measure))
    for (const line of tableLines(found)) console.log(line)
    rows.push(...found)
    seconds[name] = (performance.now() - started) / 1000
    console.log(`  (${seconds[name].toFixed(0)} s)`)
  }
} finally {
  rmSync(folder, { recursive: true, force: true })
}
mkdirSync(join(project, 'out'), { recursive: true })
const file = join(project, 'out', 'bench.json')
const machine = { processor: cpus()[0]?.model ?? 'unknown', threads: availableParallelism(), node: process.version }
writeFileSync(
  file,
  `${JSON.stringify({ program: 'motelight', version, machine, date: new Date().toISOString(), seconds, rows }, null, 2)}\n`
)
const all = Object.values(seconds).reduce((sum, each) => sum + each, 0)
console.log(`\nWritten: ${file} (${(all / 60).toFixed(1)} min)`)
