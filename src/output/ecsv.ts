/** A column of numbers or texts; `unit` in a notation that astropy reads (`um`, `Jy`, `W m-2 Hz-1`). */
export interface EcsvColumn {
  name: string
  unit?: string
  description?: string
  values: ArrayLike<number> | string[]
}

/**
 * A table in Enhanced Character-Separated Values 1.0 (Astropy Proposal for Enhancement 6): a YAML header in comment
 * lines, the column names, one row a line. Columns have the same length. Numbers read back as the same doubles.
 */
export function ecsv(columns: EcsvColumn[], meta: Record<string, string | number>): string {
  const quote = (text: string): string => JSON.stringify(text)
  const header = [
    '%ECSV 1.0',
    '---',
    'datatype:',
    ...columns.map(({ name, unit, description, values }) => {
      const parts = [`name: ${quote(name)}`, `datatype: ${typeof values[0] === 'string' ? 'string' : 'float64'}`]
      if (unit) parts.splice(1, 0, `unit: ${quote(unit)}`)
      if (description) parts.push(`description: ${quote(description)}`)
      return `- {${parts.join(', ')}}`
    }),
    `meta: {${Object.entries(meta)
      .map(([key, value]) => `${quote(key)}: ${typeof value === 'string' ? quote(value) : value}`)
      .join(', ')}}`,
    'schema: astropy-2.0'
  ]
  const rows = Array.from({ length: columns[0].values.length }, (_, row) =>
    columns.map(({ values }) => cell(values[row])).join(' ')
  )
  return `${[...header.map((line) => `# ${line}`), columns.map(({ name }) => field(name)).join(' '), ...rows].join('\n')}\n`
}

function cell(value: number | string): string {
  if (typeof value === 'string') return field(value)
  if (Number.isNaN(value)) return 'nan'
  return Number.isFinite(value) ? String(value) : value > 0 ? 'inf' : '-inf'
}

function field(name: string): string {
  return name === '' || /[\s"]/.test(name) ? `"${name.replaceAll('"', '""')}"` : name
}
