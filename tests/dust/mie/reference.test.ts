import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { type Efficiencies, efficiencies } from '../../../src/dust/mie/efficiencies.js'
import { coated, type Index, sphereEfficiencies } from './sphere.js'

interface Row extends Efficiencies {
  x: number
  xCore: number
  core: Index
  coat: Index
}

/** Made by reference.py: textbook formulas in 400 digits and more. */
const rows: Row[] = JSON.parse(readFileSync(new URL('./reference.json', import.meta.url), 'utf8'))

describe('efficiencies against the textbook formulas in hundreds of digits', () => {
  it.each(rows)('x = $x, core $xCore $core, coat $coat', (row) => {
    const found = row.xCore > 0 ? efficiencies(coated(row.xCore, row.x, row.core, row.coat)) : sphereEfficiencies(row.x, row.coat)
    const relative = (key: keyof Efficiencies) => Math.abs(found[key] - row[key]) / Math.abs(row[key])
    for (const key of ['extinction', 'scattering', 'asymmetry'] as const) expect(relative(key), key).toBeLessThan(3e-12)
    // the sum for the light straight back loses what its terms exceed it by
    expect(relative('backscattering')).toBeLessThan(1e-9)
    if (row.core[1] === 0 && row.coat[1] === 0) expect(Math.abs(found.absorption)).toBe(0)
    else expect(relative('absorption')).toBeLessThan(1e-11)
  })
})
