// Makes the fictitious observations in `data`: runs scene.yaml, observes it as night.yaml says, and keeps what observers would.
// Seeds stand in both files, so the same program makes the same data again.
import { execFileSync } from 'node:child_process'
import { cpSync, mkdirSync, mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'

const here = dirname(fileURLToPath(import.meta.url))
const program = join(here, '../../dist/cli/main.js')
const work = mkdtempSync(join(tmpdir(), 'two-telescopes-'))
const motelight = (...words) => execFileSync('node', [program, ...words], { stdio: 'inherit' })

try {
  motelight('run', join(here, 'scene.yaml'), '--out', join(work, 'run'))
  motelight('observe', join(work, 'run'), join(here, 'night.yaml'), '--out', join(work, 'seen'))
  mkdirSync(join(here, 'data'), { recursive: true })
  for (const file of ['pictures/infrared.fits', 'pictures/millimetre.fits', 'photometry.ecsv', 'visibilities/visibilities.ecsv'])
    cpSync(join(work, 'seen', file), join(here, 'data', file.split('/').at(-1)))
} finally {
  rmSync(work, { recursive: true, force: true })
}
