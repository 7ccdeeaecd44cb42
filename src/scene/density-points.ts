import { dimensions } from '../units/dimension.js'
import { type Column, parseCsvTable } from './csv-table.js'
import { scaled } from './scaled-units.js'
import type { DensityPoints } from './types.js'

const lengthUnits = scaled(dimensions.length.units)
const farAway = 1e30
const place = (name: string): Column => ({
  name,
  units: lengthUnits,
  refuse: (value) => (Math.abs(value) < farAway ? undefined : 'a sensible length is expected')
})

const columns: Column[] = [
  place('x'),
  place('y'),
  place('z'),
  {
    name: 'smoothing-length',
    units: lengthUnits,
    refuse: (value) => (value > 0 && value < farAway ? undefined : 'a length above 0 is expected')
  },
  { name: 'mass', optional: true, refuse: (value) => (value > 0 ? undefined : 'a mass above 0 is expected') }
]

/** Reads points of a simulation: x, y, z, smoothing-length, mass (relative, default 1). `shownAs` names the file in errors. */
export function parseDensityPoints(text: string, file: string, shownAs: string): DensityPoints {
  const { columns: read, lines } = parseCsvTable(text, shownAs, columns)
  const column = (name: string) => read.get(name)!
  return {
    kind: 'points',
    file,
    x: column('x'),
    y: column('y'),
    z: column('z'),
    smoothingLength: column('smoothing-length'),
    mass: read.get('mass') ?? new Float64Array(lines.length).fill(1)
  }
}
