import type { Column } from './csv-table.js'

/** Units of a column, from the size of each in cgs. */
export function scaled(units: Record<string, number>): Column['units'] {
  return Object.fromEntries(Object.entries(units).map(([unit, size]) => [unit, (value: number) => value * size]))
}
