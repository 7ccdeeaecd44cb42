import { parseDocument } from 'yaml'
import { DataError } from './error.js'
import { bytesOf } from './read-bytes.js'

/** A table of Enhanced Character-Separated Values: numbers (NaN where there is none), or texts, by column. */
export interface EcsvTable {
  file: string
  columns: Map<string, { unit?: string; values: Float64Array | string[] }>
  meta: Record<string, unknown>
}

interface EcsvHeader {
  delimiter?: string
  datatype?: { name: string; unit?: string; datatype: string }[]
  meta?: Record<string, unknown>
}

/** Reads an ECSV 1.0 file (Astropy Proposal for Enhancement 6). Throws a DataError. */
export function readEcsv(file: string): EcsvTable {
  return parseEcsv(new TextDecoder().decode(bytesOf(file)), file)
}

/** The table in the text of an ECSV 1.0 file; `file` names it in errors. Throws a DataError. */
export function parseEcsv(text: string, file: string): EcsvTable {
  const lines = text.split(/\r?\n/)
  const comments = lines.filter((line) => line.startsWith('#')).map((line) => line.replace(/^# ?/, ''))
  if (!/^%ECSV 1\./.test(comments[0] ?? '')) throw new DataError(file, 'is no ECSV 1.0 file (it does not begin with # %ECSV 1.0)')
  const header = headerOf(comments.slice(1).join('\n'), file)
  const delimiter = header.delimiter ?? ' '
  const rows = lines.filter((line) => line.trim() !== '' && !line.startsWith('#')).map((line) => cells(line, delimiter))
  const names = rows.shift() ?? []
  const types = header.datatype ?? []
  if (names.length !== types.length || names.some((name, i) => name !== types[i].name))
    throw new DataError(file, 'the names of the columns differ from those of the header')
  const odd = rows.findIndex((row) => row.length !== names.length)
  if (odd >= 0) throw new DataError(file, `row ${odd + 1} has ${rows[odd].length} values; ${names.length} are expected`)
  const columns = types.map(({ name, unit, datatype }, i) => {
    const texts = rows.map((row) => row[i])
    const values = datatype === 'string' ? texts : Float64Array.from(texts, (text) => (text === '' ? Number.NaN : numberOf(text)))
    return [name, { ...(unit && { unit }), values }] as const
  })
  return { file, columns: new Map(columns), meta: header.meta ?? {} }
}

/** A column of numbers. Throws a DataError that lists what there is. */
export function ecsvNumbers({ file, columns }: EcsvTable, name: string): Float64Array {
  const values = columns.get(name)?.values
  if (values instanceof Float64Array) return values
  throw new DataError(file, `has no column of numbers ${name}; there are ${[...columns.keys()].join(', ')}`)
}

function headerOf(text: string, file: string): EcsvHeader {
  const document = parseDocument(text, { logLevel: 'error' })
  if (document.errors.length > 0) throw new DataError(file, 'the header is no sound YAML')
  return (document.toJS() ?? {}) as EcsvHeader
}

/** Values of a line, some in double quotes with quotes doubled inside; several spaces are one delimiter. */
function cells(line: string, delimiter: string): string[] {
  const pattern = delimiter === ' ' ? /"((?:[^"]|"")*)"|[^\s"]+/g : /"((?:[^"]|"")*)"|[^,"]+|(?<=,|^)(?=,|$)/g
  return [...line.trim().matchAll(pattern)].map(([whole, quoted]) =>
    quoted === undefined ? whole : quoted.replaceAll('""', '"')
  )
}

function numberOf(text: string): number {
  const word = text.trim().toLowerCase()
  if (/^[+-]?inf(inity)?$/.test(word)) return word.startsWith('-') ? Number.NEGATIVE_INFINITY : Number.POSITIVE_INFINITY
  return Number(word)
}
