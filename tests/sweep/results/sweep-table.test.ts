import { readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { DuckDBInstance } from '@duckdb/node-api'
import { describe, expect, it } from 'vitest'
import { ecsv } from '../../../src/output/ecsv.js'
import { parquet } from '../../../src/output/parquet.js'
import type { ModelResult } from '../../../src/sweep/folder/model-result.js'
import { judged } from '../../../src/sweep/results/outcomes.js'
import { sweepTable } from '../../../src/sweep/results/sweep-table.js'
import { folderWith } from '../../support/folder-with.js'
import { askPython, astropy, itWith } from '../../support/python.js'
import { planned } from '../example.js'

const sweep = planned(`vary:
  dust.wind.amount.optical-depth: {from: 0.1, to: 10, count: 3, spacing: log}
  sources.giant.temperature: [2600 K]
  dust.wind.temperature: [solve, none]
  sources.giant.luminosity: [4321.5 Lsun]
data: [{name: old, file: fluxes.csv, spectrum: sed}]
`)

function result(model: number): ModelResult {
  const flux = [model / 3, Math.PI * 1e-300, Number.NaN]
  const wavelengthUm = [2.2, 10, 60]
  return {
    model,
    precise: model !== 2,
    spectra: [
      { name: 'sed', unit: 'W/m2', wavelengthUm, flux, sigma: [0.1, 1 / 7, Number.NaN] },
      { name: 'data-old', unit: 'Jy', wavelengthUm, flux: [310, 200, 8], sigma: [0, 0, 1] }
    ],
    images: [{ name: 'face', unit: 'MJy/sr', wavelengthUm: [2.2], fluxJy: [1e-12], peak: [model], peakSigma: [0.25] }],
    packets: 1234567,
    warnings: model === 1 ? ['a "quoted" word', "it's, µm;  two"] : [],
    cpuSeconds: 1
  }
}

const outcomes = {
  results: new Map([1, 2, 4, 5].map((model) => [model, result(model)])),
  failures: new Map([[3, { model: 3, message: 'no memory\nat all' }]])
}
const table = sweepTable(sweep, judged(sweep, outcomes))
const folder = folderWith()
writeFileSync(join(folder, 'models.parquet'), parquet(table, { origin: 'motelight test', title: 'Winds' }))
writeFileSync(join(folder, 'models.ecsv'), ecsv(table, { title: 'Winds' }))

/** JSON has no NaN. */
const plain = (value: unknown): unknown =>
  Array.isArray(value) ? value.map(plain) : typeof value === 'bigint' ? Number(value) : Number.isNaN(value) ? 'nan' : value

describe('the table of a sweep', () => {
  it('has a row for each model, with chi squared', () => {
    const column = (name: string) => table.find((one) => one.name === name)!.values
    expect(column('model')).toEqual([1, 2, 3, 4, 5, 6])
    expect(column('state')).toEqual(['done', 'imprecise', 'failed', 'done', 'done', 'unfinished'])
    // (310 - 300)^2 / 10^2 + 0 + 0
    expect(column('chi2_old')[0]).toBeCloseTo(1, 14)
    expect(column('chi2_old')[2]).toBeNaN()
  })

  itWith(astropy, 'DuckDB (Parquet) and astropy (ECSV) read the same values, which are ours', async () => {
    const connection = await (await DuckDBInstance.create()).connect()
    const read = await connection.runAndReadAll(`select * from read_parquet('${join(folder, 'models.parquet')}')`)
    const names = read.columnNames()
    const rows = read.getRowsJS() as unknown[][]
    const theirs = askPython<{ values: Record<string, unknown[]>; units: Record<string, string>; rank: Record<string, number> }>(
      `
from astropy.table import Table
import numpy as np
table = Table.read(data)
def plain(value):
    if value is np.ma.masked: return ''  # astropy takes empty text for a missing value
    if isinstance(value, np.ndarray): return [plain(one) for one in value]
    if isinstance(value, (float, np.floating)): return 'nan' if np.isnan(value) else float(value)
    return value.item() if hasattr(value, 'item') else value
answer = {'values': {name: [plain(one) for one in table[name]] for name in table.colnames},
          'units': {name: str(table[name].unit) for name in table.colnames},
          'rank': {name: table[name].ndim for name in table.colnames}}`,
      join(folder, 'models.ecsv')
    )
    expect(names).toEqual(table.map(({ name }) => name))
    table.forEach(({ name, values }, c) => {
      const duck = plain(rows.map((row) => row[c]))
      // Line ends and runs of blanks have no place in a table of lines.
      const tidy = plain(values.map((value) => (typeof value === 'string' ? value.replace(/\s+/g, ' ') : value)))
      expect(duck, name).toEqual(plain([...values]))
      expect(theirs.values[name], name).toEqual(tidy)
    })
    expect(theirs.units).toMatchObject({
      'sources.giant.temperature': 'K',
      'sources.giant.luminosity': 'solLum',
      sed_flux: 'W / m2'
    })
    expect(theirs.rank.sed_flux).toBe(2)
  })

  it('says its units in the Parquet file too', async () => {
    const connection = await (await DuckDBInstance.create()).connect()
    const read = await connection.runAndReadAll(
      `select decode(key), decode(value) from parquet_kv_metadata('${join(folder, 'models.parquet')}')`
    )
    expect(Object.fromEntries(read.getRowsJS() as string[][])).toMatchObject({ title: 'Winds', 'unit:sed_flux': 'W m-2' })
  })

  it('the same table has the same bytes', () => {
    expect(Buffer.from(parquet(table, { origin: 'motelight test', title: 'Winds' }))).toEqual(
      readFileSync(join(folder, 'models.parquet'))
    )
  })
})
