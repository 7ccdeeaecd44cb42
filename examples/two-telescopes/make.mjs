// Makes the fictitious observations in `data`: runs scene.yaml to a sixth of its errors, for nature knows no Monte Carlo noise, observes
// it as night.yaml says, and keeps what observers would. Seeds stand in both files, so the same program makes the same data again.
import { execFileSync } from 'node:child_process'
import { cpSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'

const here = dirname(fileURLToPath(import.meta.url))
const program = join(here, '../../dist/cli/main.js')
const work = mkdtempSync(join(tmpdir(), 'two-telescopes-'))
const motelight = (...words) => execFileSync('node', [program, ...words], { stdio: 'inherit' })

try {
  const scene = readFileSync(join(here, 'scene.yaml'), 'utf8')
    .replace('precision: 3 %, equilibrium: 2e6', 'precision: 0.5 %, equilibrium: 2e7, cameras: 1e7')
    .replace('../../', `${join(here, '../..')}/`)
  writeFileSync(join(work, 'scene.yaml'), scene)
  motelight('run', join(work, 'scene.yaml'), '--out', join(work, 'run'), '--seed', 'nature')
  motelight('observe', join(work, 'run'), join(here, 'night.yaml'), '--out', join(work, 'seen'))
  mkdirSync(join(here, 'data'), { recursive: true })
  for (const file of ['pictures/infrared.fits', 'pictures/millimetre.fits', 'photometry.ecsv', 'visibilities/visibilities.ecsv'])
    cpSync(join(work, 'seen', file), join(here, 'data', file.split('/').at(-1)))
} finally {
  rmSync(work, { recursive: true, force: true })
}
