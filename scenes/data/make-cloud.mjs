// Makes cloud.fits beside it: `node scenes/data/make-cloud.mjs`. An invented cloud: relative densities that vary as the exponential of
// many waves, long ones stronger, and fade outwards. The same bytes every time.
import { writeFileSync } from 'node:fs'
import seedrandom from 'seedrandom'

const SIDE = 32
const WAVES = 240
/** Cycles across the cube, and power by which amplitudes fall with them. */
const CYCLES = [1, 9]
const FALL = -1.2
/** Standard deviation of ln(density), radius of the cloud in half sides of the cube, and how sharply it ends. */
const SPREAD = 1.6
const RADIUS = 0.62
const SHARPNESS = 3

const uniform = seedrandom('imported cloud')
const waves = Array.from({ length: WAVES }, () => {
  const cycles = CYCLES[0] * (CYCLES[1] / CYCLES[0]) ** uniform()
  const cosTheta = 2 * uniform() - 1
  const phi = 2 * Math.PI * uniform()
  const sinTheta = Math.sqrt(1 - cosTheta * cosTheta)
  // Half a cycle a unit: coordinates run from -1 to 1.
  const k = [sinTheta * Math.cos(phi), sinTheta * Math.sin(phi), cosTheta].map((part) => Math.PI * cycles * part)
  return { k, amplitude: cycles ** FALL, phase: 2 * Math.PI * uniform() }
})
const scale = SPREAD / Math.sqrt(waves.reduce((sum, { amplitude }) => sum + amplitude ** 2 / 2, 0))

const density = new Float64Array(SIDE ** 3)
for (let i = 0; i < density.length; i++) {
  const at = [i % SIDE, Math.floor(i / SIDE) % SIDE, Math.floor(i / SIDE ** 2)].map((n) => (2 * (n + 0.5)) / SIDE - 1)
  let sum = 0
  for (const { k, amplitude, phase } of waves) sum += amplitude * Math.cos(k[0] * at[0] + k[1] * at[1] + k[2] * at[2] + phase)
  density[i] = Math.exp(scale * sum - (Math.hypot(...at) / RADIUS) ** SHARPNESS)
}

const most = density.reduce((a, b) => Math.max(a, b))
const cards = [
  'SIMPLE  =                    T',
  'BITPIX  =                   16',
  'NAXIS   =                    3',
  ...[1, 2, 3].map((axis) => `NAXIS${axis}  = ${String(SIDE).padStart(20)}`),
  "OBJECT  = 'Imported cloud'     / relative density, x first, invented",
  'END'
]
const header = cards.map((card) => card.padEnd(80)).join('').padEnd(2880)
const data = Buffer.alloc(2880 * Math.ceil((2 * density.length) / 2880))
density.forEach((value, i) => {
  data.writeInt16BE(Math.round((32767 * value) / most), 2 * i)
})
writeFileSync(new URL('cloud.fits', import.meta.url), Buffer.concat([Buffer.from(header, 'ascii'), data]))
