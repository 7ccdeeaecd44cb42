import type { SchemaElement } from 'hyparquet'
import { parquetWriteBuffer } from 'hyparquet-writer'
import type { TableColumn } from './table-column.js'

const types = { number: 'DOUBLE', integer: 'INT32', text: 'BYTE_ARRAY', list: 'DOUBLE' } as const

/**
 * A table in Apache Parquet: doubles, 32-bit integers, text in UTF-8 and lists of doubles, none of them null. Units stand in the
 * metadata of the file as `unit:<column>`, other words under their own key.
 */
export function parquet(columns: TableColumn[], meta: Record<string, string>): Uint8Array {
  const units = columns.filter(({ unit }) => unit).map(({ name, unit }) => ({ key: `unit:${name}`, value: unit! }))
  const buffer = parquetWriteBuffer({
    columnData: columns.map(({ name, values }) => ({ name, data: values })),
    schema: [{ name: 'root', num_children: columns.length }, ...columns.flatMap(schemaOf)],
    kvMetadata: [...Object.entries(meta).map(([key, value]) => ({ key, value })), ...units],
    createdBy: meta.origin ?? 'motelight'
  })
  return new Uint8Array(buffer)
}

function schemaOf({ name, kind }: TableColumn): SchemaElement[] {
  const type = types[kind]
  if (kind !== 'list') return [{ name, type, repetition_type: 'REQUIRED', ...(kind === 'text' && { converted_type: 'UTF8' }) }]
  // The three levels that the format prescribes for lists.
  return [
    { name, repetition_type: 'REQUIRED', num_children: 1, converted_type: 'LIST' },
    { name: 'list', repetition_type: 'REPEATED', num_children: 1 },
    { name: 'element', type, repetition_type: 'REQUIRED' }
  ]
}
