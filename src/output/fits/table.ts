import { ascii, card } from './card.js'
import { hdu } from './hdu.js'

/**
 * A column of 64-bit reals. In its name, what is no letter, digit or underscore becomes an underscore (FITS Standard 4.0,
 * section 7.3.2). `unit` is in FITS notation (`AU`, `g cm-3`); `repeat` numbers make one row (default 1).
 */
export interface FitsColumn {
  name: string
  unit?: string
  values: Float64Array
  repeat?: number
  /** Lengths of the axes of one row's array, the fastest first. */
  dimensions?: number[]
}

/** A binary-table HDU (FITS Standard 4.0, section 7.3), big-endian. Every column has the same number of rows. */
export function tableHdu(name: string, columns: FitsColumn[], cards: string[] = []): Uint8Array {
  const repeats = columns.map((column) => column.repeat ?? 1)
  const rows = columns[0].values.length / repeats[0]
  columns.forEach((column, i) => {
    if (column.values.length !== rows * repeats[i]) throw new RangeError(`column ${column.name} does not have ${rows} rows`)
  })
  const rowBytes = 8 * repeats.reduce((sum, repeat) => sum + repeat, 0)
  const structure = [
    card('XTENSION', 'BINTABLE', 'binary table'),
    card('BITPIX', 8),
    card('NAXIS', 2),
    card('NAXIS1', rowBytes, 'bytes in a row'),
    card('NAXIS2', rows, 'rows'),
    card('PCOUNT', 0),
    card('GCOUNT', 1),
    card('TFIELDS', columns.length, 'columns'),
    ...columns.flatMap((column, i) => columnCards(column, i + 1)),
    card('EXTNAME', name)
  ]
  return hdu([...structure, ...cards], tableBytes(columns, repeats, rows, rowBytes))
}

function columnCards({ name, unit, repeat = 1, dimensions }: FitsColumn, number: number): string[] {
  return [
    card(`TTYPE${number}`, ascii(name).replace(/\W/g, '_')),
    card(`TFORM${number}`, `${repeat}D`),
    ...(unit ? [card(`TUNIT${number}`, unit)] : []),
    ...(dimensions ? [card(`TDIM${number}`, `(${dimensions.join(',')})`)] : [])
  ]
}

function tableBytes(columns: FitsColumn[], repeats: number[], rows: number, rowBytes: number): Uint8Array {
  const data = new Uint8Array(rows * rowBytes)
  const view = new DataView(data.buffer)
  let start = 0
  columns.forEach(({ values }, c) => {
    const repeat = repeats[c]
    for (let i = 0; i < values.length; i++) {
      view.setFloat64(Math.floor(i / repeat) * rowBytes + start + 8 * (i % repeat), values[i])
    }
    start += 8 * repeat
  })
  return data
}
