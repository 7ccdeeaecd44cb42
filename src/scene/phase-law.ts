import { dimensions } from '../units/dimension.js'
import { type Column, parseCsvTable } from './csv-table.js'
import type { DataFiles } from './data-files.js'
import { SceneError, type SceneProblem } from './error.js'
import type { MatrixTable, PhaseLaw, ScenePath } from './types.js'

/** A scattering law as a scene writes it: the table still in its file. */
export type PhaseEntry = Exclude<PhaseLaw, { kind: 'table' }> | { kind: 'table'; file: string }

/** The law with its file read; undefined, and a problem more among `files`, when that cannot be used. */
export function phaseLaw(entry: PhaseEntry, path: ScenePath, files: DataFiles): PhaseLaw | undefined {
  if (typeof entry === 'string' || entry.kind !== 'table') return entry
  const table = files.read(entry.file, [...path, 'table'], parseMatrixTable)
  return table && { kind: 'table', table }
}

/** How far rounded numbers in a file may break an inequality, relative to s11. */
const ROUNDING = 1e-3

const number = () => undefined
const notNegative = (value: number) => (value >= 0 ? undefined : 'must not be negative')
const angle: Column = {
  name: 'angle',
  units: Object.fromEntries(
    ['deg', 'rad'].map((unit) => [unit, (value: number) => value * dimensions.angle.units[unit as 'deg' | 'rad']])
  ),
  refuse: (value) => (value >= 0 && value <= Math.PI * (1 + 1e-6) ? undefined : 'an angle from 0 to 180 deg is expected')
}

/**
 * Reads a scattering law: angle with `value`, a phase function of any scale, or with s11, s12, s33, s34. Refuses what no scattering
 * matrix can be: angles that do not cover 0 to 180 deg, |s12| > s11, s12^2 + s33^2 + s34^2 > s11^2, polarisation straight on or back.
 */
export function parseMatrixTable(text: string, file: string, shownAs: string): MatrixTable {
  const scalar = /^[^#\n]*\bvalue\b/m.test(text)
  const others = ['s12', 's33', 's34'].map((name) => ({ name, refuse: number }))
  const columns = scalar
    ? [angle, { name: 'value', refuse: notNegative }]
    : [angle, { name: 's11', refuse: notNegative }, ...others]
  const table = parseCsvTable(text, shownAs, columns)
  const angles = table.columns.get('angle')!
  const order = table.lines.map((_, i) => i).sort((a, b) => angles[a] - angles[b])
  const column = (name: string) => Float64Array.from(order, (row) => table.columns.get(name)?.[row] ?? 0)
  const lines = order.map((row) => table.lines[row])
  const found: MatrixTable = {
    file,
    angles: column('angle'),
    s11: column(scalar ? 'value' : 's11'),
    s12: column('s12'),
    s33: column('s33'),
    s34: column('s34')
  }
  const problems = faults(found).map(
    ({ row, key, message }): SceneProblem => ({ location: { file: shownAs, line: lines[row], column: 1 }, key, message })
  )
  if (problems.length > 0) throw new SceneError(problems.slice(0, 30))
  found.angles[0] = 0
  found.angles[order.length - 1] = Math.PI
  return found
}

function faults({ angles, s11, s12, s33, s34 }: MatrixTable): { row: number; key: string; message: string }[] {
  const last = angles.length - 1
  const found: { row: number; key: string; message: string }[] = []
  const report = (row: number, key: string, message: string) => found.push({ row, key, message })
  const degrees = (value: number) => `${Number(((value * 180) / Math.PI).toPrecision(6))} deg`
  if (angles[0] > 1e-6) report(0, 'angle', `angles must begin at 0 deg; the smallest is ${degrees(angles[0])}`)
  if (angles[last] < Math.PI * (1 - 1e-6))
    report(last, 'angle', `angles must reach 180 deg; the largest is ${degrees(angles[last])}`)
  for (let i = 0; i <= last; i++) {
    const most = s11[i] * (1 + ROUNDING)
    const key = 's12'
    if (i > 0 && !(angles[i] > angles[i - 1])) report(i, 'angle', `the angle ${degrees(angles[i])} is given again`)
    if (Math.abs(s12[i]) > most) report(i, key, '|s12| must not be greater than s11: light cannot be more than wholly polarised')
    else if (Math.hypot(s12[i], s33[i], s34[i]) > most) report(i, 's33', 's12^2 + s33^2 + s34^2 must not be greater than s11^2')
    else if ((i === 0 || i === last) && Math.abs(s12[i]) > 10 * ROUNDING * s11[i])
      report(i, key, 'must be 0 at 0 and 180 deg, where no direction across the light is distinguished')
  }
  if (s11.every((value) => value === 0)) report(0, 's11', 'every value is 0')
  return found
}
