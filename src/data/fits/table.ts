import { DataError } from '../error.js'
import type { FitsUnit } from './read.js'

/** A numeric column of a binary table: `repeat` numbers a row. */
export interface FitsColumnValues {
  values: Float64Array
  repeat: number
  unit: string | undefined
}

/** Bytes of one element of each TFORM letter (FITS Standard 4.0, table 18), and how numbers are read. */
const forms: Record<string, { bytes: number; get?: (view: DataView, at: number) => number }> = {
  L: { bytes: 1 },
  X: { bytes: 1 / 8 },
  B: { bytes: 1, get: (view, at) => view.getUint8(at) },
  I: { bytes: 2, get: (view, at) => view.getInt16(at) },
  J: { bytes: 4, get: (view, at) => view.getInt32(at) },
  K: { bytes: 8, get: (view, at) => Number(view.getBigInt64(at)) },
  A: { bytes: 1 },
  E: { bytes: 4, get: (view, at) => view.getFloat32(at) },
  D: { bytes: 8, get: (view, at) => view.getFloat64(at) },
  C: { bytes: 8 },
  M: { bytes: 16 },
  P: { bytes: 8 },
  Q: { bytes: 16 }
}

/** A column of numbers by its name, whatever its case, scaled by TSCAL and TZERO. Throws a DataError. */
export function tableColumn({ file, name, kind, header, axes, data }: FitsUnit, column: string): FitsColumnValues {
  if (kind !== 'table') throw new DataError(file, `${name} is no binary table`)
  const view = new DataView(data.buffer, data.byteOffset, data.byteLength)
  const [rowBytes, rows] = axes
  const names: string[] = []
  let offset = 0
  for (let i = 1; i <= (header.number('TFIELDS') ?? 0); i++) {
    const [, count = '', letter = ''] = /^(\d*)([A-Z])/.exec(header.text(`TFORM${i}`)?.trim() ?? '') ?? []
    const form = forms[letter]
    if (!form) throw new DataError(file, `${name} has an unsound TFORM${i}`)
    const repeat = count === '' ? 1 : Number(count)
    const title = header.text(`TTYPE${i}`) ?? ''
    names.push(title)
    if (title.toUpperCase() === column.toUpperCase()) {
      const { bytes, get } = form
      if (!get) throw new DataError(file, `the column ${column} of ${name} holds no numbers`)
      const scale = header.number(`TSCAL${i}`) ?? 1
      const zero = header.number(`TZERO${i}`) ?? 0
      const values = Float64Array.from(
        { length: rows * repeat },
        (_, k) => zero + scale * get(view, Math.floor(k / repeat) * rowBytes + offset + bytes * (k % repeat))
      )
      return { values, repeat, unit: header.text(`TUNIT${i}`) }
    }
    offset += Math.ceil(form.bytes * repeat)
  }
  throw new DataError(file, `${name} has no column ${column}; there are ${names.join(', ')}`)
}
