import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { DataError } from '../../src/data/error.js'
import { imageValues } from '../../src/data/fits/image.js'
import { firstImage, readFits, unitNamed } from '../../src/data/fits/read.js'
import { tableColumn } from '../../src/data/fits/table.js'
import { imageHdu } from '../../src/output/fits/image.js'
import { folderWith } from '../support/folder-with.js'
import { astropy, itWith, runPython } from '../support/python.js'

const folder = folderWith()
const place = (name: string) => join(folder, name)

/** The message of the DataError that reading these bytes ends in. */
function refusal(bytes: Uint8Array | string, read = (file: string): unknown => readFits(file)): string {
  const file = place('wrong.fits')
  writeFileSync(file, bytes)
  try {
    read(file)
  } catch (error) {
    expect(error).toBeInstanceOf(DataError)
    return (error as DataError).reason
  }
  throw new Error('the file was accepted')
}

const sound = imageHdu('primary', [3, 2], new Float64Array([1, 2, 3, 4, 5, 6]), [])
const changed = (from: string, to: string) => Buffer.from(Buffer.from(sound).toString('latin1').replace(from, to), 'latin1')

describe('FITS files', () => {
  itWith(astropy, 'of every BITPIX, with BSCALE, BZERO, BLANK, extensions and tables, as astropy writes them', () => {
    runPython(
      `
import sys, numpy as np
from astropy.io import fits
values = np.arange(-6, 18).reshape(4, 6)
units = [fits.PrimaryHDU()]
for name, kind in [('U8', 'u1'), ('I16', 'i2'), ('I32', 'i4'), ('I64', 'i8'), ('F32', 'f4'), ('F64', 'f8'), ('U16', 'u2')]:
    units.append(fits.ImageHDU(np.abs(values).astype(kind) if kind[0] == 'u' else values.astype(kind) + (0.25 if kind[0] == 'f' else 0), name=name))
scaled = fits.ImageHDU((values * 0.5 + 100).astype('f8'), name='SCALED')
scaled.scale('int16', bscale=0.5, bzero=100)
scaled.header['BLANK'] = -6
units.append(scaled)
long = fits.ImageHDU(np.zeros((2, 2), 'f4'), name='LONG')
long.header['LONGTEXT'] = "it's " + 'x' * 120
long.header['EXPO'] = 1.5e-7
long.header['FLAG'] = True
units.append(long)
units.append(fits.BinTableHDU.from_columns([
    fits.Column('word', '5A', array=['a', 'b']), fits.Column('pair', '2J', array=[[1, 2], [3, 4]]),
    fits.Column('flux', 'E', unit='Jy', array=[0.5, -2]), fits.Column('count', 'I', bzero=32768, array=np.array([1, 65535], 'u2'))], name='TABLE'))
fits.HDUList(units).writeto(sys.stdin.read())`,
      place('kinds.fits')
    )
    const units = readFits(place('kinds.fits'))
    const values = Array.from({ length: 24 }, (_, i) => i - 6)
    for (const name of ['I16', 'I32', 'I64']) expect([...imageValues(unitNamed(units, name))], name).toEqual(values)
    for (const name of ['U8', 'U16']) expect([...imageValues(unitNamed(units, name))], name).toEqual(values.map(Math.abs))
    for (const name of ['F32', 'F64'])
      expect([...imageValues(unitNamed(units, name))], name).toEqual(values.map((value) => value + 0.25))
    expect([...imageValues(unitNamed(units, 'scaled'))]).toEqual(values.map((v) => (v === -6 ? Number.NaN : v * 0.5 + 100)))
    expect(firstImage(units).name).toBe('U8')
    expect(unitNamed(units, 'U8').axes).toEqual([6, 4])
    const { header } = unitNamed(units, 'LONG')
    expect([header.text('LONGTEXT'), header.number('EXPO'), header.has('FLAG')]).toEqual([
      `it's ${'x'.repeat(120)}`,
      1.5e-7,
      true
    ])
    const table = unitNamed(units, 'TABLE')
    expect(tableColumn(table, 'pair')).toEqual({ values: new Float64Array([1, 2, 3, 4]), repeat: 2, unit: undefined })
    expect(tableColumn(table, 'FLUX')).toEqual({ values: new Float64Array([0.5, -2]), repeat: 1, unit: 'Jy' })
    expect([...tableColumn(table, 'count').values]).toEqual([1, 65535])
    expect(() => tableColumn(table, 'word')).toThrow('holds no numbers')
    expect(() => tableColumn(table, 'none')).toThrow('there are word, pair, flux, count')
    expect(() => unitNamed(units, 'MASK')).toThrow('has no extension MASK; there are primary, U8')
  })

  it('that cannot be used are refused with the reason', () => {
    expect(() => readFits(place('absent.fits'))).toThrow('absent.fits: does not exist')
    expect(() => readFits(folder)).toThrow('is a folder')
    expect(refusal('wavelength,flux\n1,2\n')).toContain('not FITS')
    expect(refusal(new Uint8Array([0x1f, 0x8b, 0, 0]))).toContain('compressed')
    expect(refusal(sound.subarray(0, 400))).toContain('no END')
    expect(refusal(sound.subarray(0, 2880))).toContain('the data of primary are cut short')
    expect(refusal(changed('                 -64', '                 -63'))).toContain('unsound BITPIX')
    expect(refusal(changed('NAXIS2  =                    2', 'NAXIS2  =                   -2'))).toContain('unsound NAXIS2')
    expect(refusal(changed('NAXIS2  ', 'NAXISX  '))).toContain('no NAXIS2')
    const empty = imageHdu('primary', [], new Float64Array(0), [])
    expect(refusal(empty, (file) => firstImage(readFits(file)))).toContain('holds no image')
  })
})
