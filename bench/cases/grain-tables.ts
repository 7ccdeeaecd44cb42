import { join } from 'node:path'
import { grainTables } from '../../src/run/grain-tables.js'
import { parseScene } from '../../src/scene/read.js'
import { type BenchCase, interleaved, type Measure, type Tools } from '../case.js'

const REPETITIONS = 3

const silicate = `
distance: 100 pc
sources: [{name: star, temperature: 6000 K, luminosity: 1 Lsun}]
opacities:
  rock:
    law: grains
    constants: {oscillators: {infinity: 2.6, terms: [{at: 10 um, strength: 0.8, damping: 0.2}, {at: 19 um, strength: 1.6, damping: 0.35}, {at: 0.2 um, strength: 0.3, damping: 0.4}]}}
    sizes: {smallest: 5 nm, largest: 250 nm}
    grain-density: 3.3 g/cm3
    phase: computed
dust:
  - {name: shell, opacity: rock, shape: {kind: shell, inner: 10 au, outer: 100 au}, amount: {mass: 1e-9 Msun}}
effort: {equilibrium: 1000}
`

/** Seconds for the table of a size distribution with its matrices, on two threads: from nothing, and from the cache. */
async function tabulate({ folder }: Tools): Promise<Measure[]> {
  const scene = parseScene(silicate, 'bench.yaml')
  let rows = 0
  const timed = async (repetition: number) => {
    process.env.XDG_CACHE_HOME = join(folder, `cache-${repetition}`)
    const start = performance.now()
    rows = (await grainTables(scene, 2)).rock.wavelengths.length
    return (performance.now() - start) / 1000
  }
  const [first, again] = await interleaved(REPETITIONS, timed, timed)
  return [
    { quantity: 'wavelengths', unit: '', values: [rows], target: { atLeast: 200 } },
    { quantity: 'first time', unit: 's', values: first, target: { atMost: 10 } },
    { quantity: 'from the cache', unit: 's', values: again, target: { atMost: 0.1 } }
  ]
}

export const grainTableCases: BenchCase[] = [
  {
    name: 'grain-tables',
    about: 'Mie theory over a size distribution with scattering matrices, on two threads',
    native: false,
    run: tabulate
  }
]
