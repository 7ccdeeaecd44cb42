/**
 * A column of a table that holds more than numbers; `unit` in a notation that astropy reads. A list holds doubles, as many as it
 * likes in each row.
 */
export type TableColumn = { name: string; unit?: string; description?: string } & (
  | { kind: 'number' | 'integer'; values: number[] }
  | { kind: 'text'; values: string[] }
  | { kind: 'list'; values: number[][] }
)
